/** One piece of a paragraph: text as typed, or a token that is filled in when the text is rendered. */
export type Piece = { kind: "text"; text: string } | { kind: "token"; token: string };

const TOKEN = /\{\{\s*([^{}]*?)\s*\}\}/g;
const KNOWN = /^(?:F[1-9]\d*|(?:start|end):[a-z0-9][a-z0-9-]*|from|to|review)$/;

/** Cuts a paragraph at its tokens: `{{F1}}`, `{{start:eve}}`, `{{end:eve}}`, `{{from}}`, `{{to}}`, `{{review}}`. */
export function piecesOfText(text: string): Piece[] {
  const pieces: Piece[] = [];
  let at = 0;
  for (const match of text.matchAll(TOKEN)) {
    if (match.index > at) pieces.push({ kind: "text", text: text.slice(at, match.index) });
    pieces.push({ kind: "token", token: match[1] ?? "" });
    at = match.index + match[0].length;
  }
  if (at < text.length) pieces.push({ kind: "text", text: text.slice(at) });
  return pieces;
}

/** Tokens in order, repeats and all. */
export const tokensOf = (text: string): string[] => piecesOfText(text).flatMap((piece) => (piece.kind === "token" ? [piece.token] : []));
export const isKnownToken = (token: string): boolean => KNOWN.test(token);

/** Digits that stand in the text itself, group by group: facts that nothing binds. */
export const typedDigits = (text: string): string[] =>
  piecesOfText(text).flatMap((piece) => (piece.kind === "text" ? (piece.text.match(/\p{Nd}+(?:[.,:\u202f\u00a0]\p{Nd}+)*/gu) ?? []) : []));

/** The same number however it is written: grouping dropped, a decimal comma as a point, digits of other scripts as Latin ones. */
export function digitKey(digits: string): string {
  const latin = digits.replace(/\p{Nd}/gu, (digit) => {
    const zero = [0x0660, 0x06f0, 0x0966].find((each) => digit.charCodeAt(0) >= each && digit.charCodeAt(0) < each + 10);
    return zero === undefined ? digit : String(digit.charCodeAt(0) - zero);
  });
  return /^\d{1,3}(?:[.,\u202f\u00a0]\d{2,3})*[.,\u202f\u00a0]\d{3}$/.test(latin) ? latin.replace(/\D/g, "") : latin.replace(",", ".");
}

/** Braces that no token uses up, with what they hold: a reference that was mistyped and would be read as it stands. */
export const strayBraces = (text: string): string[] =>
  piecesOfText(text).flatMap((piece) => (piece.kind === "text" ? (piece.text.match(/[{}]+[^\s{}]*[{}]*/g) ?? []) : []));
