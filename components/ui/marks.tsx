import type { ReactNode } from "react";

/** The name's mark: a staff with notches on one side, a ground line, and water that draws apart below it. */
export function Wordmark() {
  return (
    <>
      <svg width="24" height="24" viewBox="0 0 26 26" aria-hidden="true" fill="none">
        <path d="M13,1V15.5 M13,4H18 M13,8H18 M13,12H18" stroke="currentColor" strokeWidth="1.75" />
        <path d="M1,15.5H25" stroke="currentColor" strokeWidth="2" />
        <path className="wl" d="M3,18.5H23 M6,22H20 M10,25.2H16" strokeWidth="1.25" />
      </svg>
      Ebbmark
    </>
  );
}

export type Level = "empty" | "started" | "half" | "most" | "full" | "returned" | "withdrawn";
const NOTCHES: Record<Level, number> = { empty: 0, started: 1, half: 2, most: 3, full: 4, returned: 2, withdrawn: 4 };

/** State mark: a notched staff, filled to the state's level. Always beside the state's word. */
export function StateMark({ level }: { level: Level }) {
  const filled = NOTCHES[level];
  return (
    <svg className="lv" width="11" height="14" viewBox="0 0 11 14" aria-hidden="true" fill="none" stroke="currentColor">
      <path d="M2.5,0.5V13.5" strokeWidth="1.5" />
      {[0, 1, 2, 3].map((notch) => {
        const y = 12 - notch * 3.4;
        return <path key={notch} d={`M2.5,${y}H9.5`} strokeWidth={notch < filled ? 2.2 : 1} opacity={notch < filled ? 1 : 0.45} />;
      })}
      {level === "returned" ? <path d="M10.5,3.5L7,0.8M10.5,3.5L7,6" strokeWidth="1.25" /> : null}
      {level === "withdrawn" ? <path d="M0,13.5L11,0.5" strokeWidth="1.5" /> : null}
    </svg>
  );
}

/** Enough mark: a small triangle above, across or below the line at 1. Always beside a word. */
export function EnoughMark({ state }: { state: "above" | "across" | "below" }) {
  const path = { above: "M10,0.5L13.6,5H6.4Z", across: "M10,3.6L14,10.4H6Z", below: "M10,13.5L6.4,9H13.6Z" }[state];
  return (
    <svg width="20" height="14" viewBox="0 0 20 14" aria-hidden="true" className="flex-none">
      <path d="M0,7H20" stroke="currentColor" strokeWidth="1.75" />
      <path d={path} fill="currentColor" />
    </svg>
  );
}

/** Check marks: a tick passes, dashes want a look, a cross stops. */
export function CheckMark({ state }: { state: "passes" | "looks" | "stops" }) {
  const path = { passes: "M2,8.5L6,12.5L14,3.5", looks: "M1,8H4.4M6.3,8H9.7M11.6,8H15", stops: "M3,3L13,13M13,3L3,13" }[state];
  const colour = { passes: "text-tide", looks: "text-brass", stops: "text-clay" }[state];
  return (
    <svg width="16" height="16" viewBox="0 0 16 16" aria-hidden="true" className={`flex-none ${colour}`} fill="none">
      <path d={path} stroke="currentColor" strokeWidth="2" />
    </svg>
  );
}

/** Package tile: colour and letter; "none" is a ring. D to H reuse the three hues with their own letter. */
export function PackageTile({ letter }: { letter: string }) {
  if (letter === "none") return <span className="pk n" aria-hidden="true" />;
  return <span className={`pk ${packageHue(letter)}`}>{letter}</span>;
}

/** Hue class of a package: a, b, c, then again. */
export function packageHue(letter: string): "a" | "b" | "c" | "n" {
  if (letter === "none") return "n";
  return (["a", "b", "c"] as const)[(letter.charCodeAt(0) - 65) % 3] ?? "n";
}

/** A figure: central value, its interval beside it, smaller, and the unit. */
export function Figure({ value, interval, unit }: { value: ReactNode; interval?: ReactNode; unit?: ReactNode }) {
  return (
    <bdi className="fig">
      <b>{value}</b>
      {interval ? <span className="iv">{interval}</span> : null}
      {unit ? <span className="u">{unit}</span> : null}
    </bdi>
  );
}

/** The waterline: a strong line with fine parallels below it that draw apart. */
export function Waterline() {
  return (
    <svg className="wline w-full" height="22" viewBox="0 0 1440 22" preserveAspectRatio="none" aria-hidden="true">
      <path d="M0,1H1440" stroke="var(--ink)" strokeWidth="2" vectorEffect="non-scaling-stroke" />
      {[4, 7.5, 12, 18].map((y, i) => (
        <path key={y} d={`M0,${y}H1440`} stroke="var(--water)" strokeWidth="1" opacity={1 - i * 0.2} vectorEffect="non-scaling-stroke" />
      ))}
    </svg>
  );
}
