/** RFC 8785 text and its SHA-256: one implementation, the engine's, for frozen files, texts and the register. */
export { canonicalJson, sha256Hex } from "./engine/canonical";
