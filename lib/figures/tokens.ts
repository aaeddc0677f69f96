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
