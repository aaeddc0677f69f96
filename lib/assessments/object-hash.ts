import { sha256Hex } from "@/lib/canonical-json";

/** What the register binds: SHA-256 over the three hashes, joined by "|". */
export const objectHashOf = ({ inputHash, resultHash, contextHash }: { inputHash: string; resultHash: string; contextHash: string }): string =>
  sha256Hex(`${inputHash}|${resultHash}|${contextHash}`);
