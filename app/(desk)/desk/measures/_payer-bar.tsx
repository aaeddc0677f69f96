type Shares = { public: number; business: number; household: number };
const FILL = { public: "var(--ink)", business: "var(--water)", household: "var(--rule)" } as const;

/** Who bears a measure's daily cost: one bar, and the same in words. */
export function PayerBar({ shares, names }: { shares: Shares; names: Record<keyof Shares, string> }) {
  const total = shares.public + shares.business + shares.household;
  if (total <= 0) return <span className="dim">–</span>;
  const parts = (Object.keys(shares) as (keyof Shares)[]).filter((payer) => shares[payer] > 0);
  let x = 0;
  return (
    <>
      <svg width="84" height="8" viewBox="0 0 84 8" aria-hidden="true">
        {parts.map((payer) => {
          const width = (84 * shares[payer]) / total;
          const bar = <rect key={payer} x={x} width={Math.max(0, width - 1)} height="8" fill={FILL[payer]} />;
          x += width;
          return bar;
        })}
      </svg>
      <span className="xs dim block">{parts.map((payer) => `${names[payer]} ${Math.round((100 * shares[payer]) / total)} %`).join(", ")}</span>
    </>
  );
}
