/** An argument of an ICU message: its name, and the cases it distinguishes where it chooses between texts. */
export type Argument = { name: string; kind: "simple" | "plural" | "selectordinal" | "select"; cases: string[] };

/**
 * Arguments of an ICU message, those inside cases too. Reads the part of the syntax that our catalogues use (no quoting).
 * @throws Error where braces don't match or a choice has no cases
 */
export function argumentsOf(message: string): Argument[] {
  const found: Argument[] = [];
  let at = 0;
  const fail = (why: string): never => {
    throw new Error(`${why} at ${at} in “${message}”`);
  };
  const word = (): string => {
    const match = /^\s*([^\s,{}]+)\s*/.exec(message.slice(at)) ?? fail("a name is missing");
    at += match[0].length;
    return match[1] ?? "";
  };
  const text = (depth: number): void => {
    for (; at < message.length; at += 1) {
      const sign = message[at];
      if (sign === "{") argument();
      else if (sign === "}") {
        if (depth === 0) fail("a brace too many");
        return;
      }
    }
    if (depth > 0) fail("a brace too few");
  };
  /** From the opening brace to the closing one; leaves `at` on the latter. */
  const argument = (): void => {
    at += 1;
    const name = word();
    const one: Argument = { name, kind: "simple", cases: [] };
    found.push(one);
    if (message[at] === ",") {
      at += 1;
      const kind = word();
      if (kind === "plural" || kind === "selectordinal" || kind === "select") {
        one.kind = kind;
        if (message[at] !== ",") fail("cases are missing");
        at += 1;
        while (!/^\s*\}/.test(message.slice(at))) {
          one.cases.push(word());
          if (message[at] !== "{") fail("a case has no text");
          at += 1;
          text(1);
          at += 1;
        }
        at += /^\s*/.exec(message.slice(at))?.[0].length ?? 0;
      } else {
        const end = message.indexOf("}", at);
        if (end < 0) fail("a brace too few");
        at = end;
      }
    }
    if (message[at] !== "}") fail("a brace too few");
  };
  text(0);
  return found;
}
