/**
 * What the sink does with a recipient, so that every answer of a mail server can be met on purpose. The part of the
 * address before "+" or "@" says it; with "-once" at the end only the first time:
 * `reply-450`, `reply-550-5.1.1` (at RCPT), `data-554-5.7.1` (after the dot), `drop-at-rcpt`, `drop-before-dot`,
 * `drop-after-dot` (taken, but the answer is lost), `lose-after-dot` (not taken, and no answer), `silent-at-rcpt`,
 * `silent-after-dot` (taken). Everything else is taken.
 */
export type Script =
  | { act: "take" }
  | { act: "reply"; at: "rcpt" | "data"; code: number; text: string }
  | { act: "drop"; at: "rcpt" | "beforeDot" }
  | { act: "drop"; at: "afterDot"; taken: boolean }
  | { act: "silent"; at: "rcpt" | "afterDot" };

const WORDS: Record<string, Script> = {
  "drop-at-rcpt": { act: "drop", at: "rcpt" },
  "drop-before-dot": { act: "drop", at: "beforeDot" },
  "drop-after-dot": { act: "drop", at: "afterDot", taken: true },
  "lose-after-dot": { act: "drop", at: "afterDot", taken: false },
  "silent-at-rcpt": { act: "silent", at: "rcpt" },
  "silent-after-dot": { act: "silent", at: "afterDot" },
};

/** Reads scripts from addresses and remembers which "-once" it has met. */
export function scriptReader(): (address: string) => Script {
  const met = new Set<string>();
  return (address) => {
    const local = (address.split("@")[0] ?? "").split("+")[0] ?? "";
    const once = local.endsWith("-once");
    if (once && met.has(address)) return { act: "take" };
    const script = scriptOf(once ? local.slice(0, -"-once".length) : local);
    if (once && script.act !== "take") met.add(address);
    return script;
  };
}

export function scriptOf(words: string): Script {
  const [, at, code, status] = /^(reply|data)-([45]\d\d)(?:-([45]\.\d+\.\d+))?$/.exec(words) ?? [];
  if (at && code) return { act: "reply", at: at === "reply" ? "rcpt" : "data", code: Number(code), text: `${status ? `${status} ` : ""}as the address asks for` };
  return WORDS[words] ?? { act: "take" };
}
