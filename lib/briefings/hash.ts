import { sha256Hex } from "../engine";

/** What a translation was made from: white space that nobody sees doesn't count. */
export const sourceHash = (text: string): string => sha256Hex(text.normalize("NFC").replace(/\s+/g, " ").trim());
