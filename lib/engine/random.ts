import { uniformInt } from "pure-rand/distribution/uniformInt";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { normalQuantile } from "./numeric";

/** FNV-1a, 32 bits: turns an input's name into a stream of its own. */
function hashName(name: string): number {
  let hash = 0x811c9dc5;
  for (let i = 0; i < name.length; i++) hash = Math.imul(hash ^ name.charCodeAt(i), 0x01000193);
  return hash | 0;
}

/** 53 random bits in [0, 1). */
const uniform = (generator: { next(): number }): number =>
  ((generator.next() >>> 5) * 0x400_0000 + (generator.next() >>> 6)) / 2 ** 53;

/**
 * One dimension of a Latin hypercube, as standard normal scores: each of `count` equal strata holds exactly one draw.
 * Every input has a stream of its own, named, so that the order of measures or packages changes no draw.
 * @param seed whole number ≥ 0
 * @see McKay, Beckman & Conover (1979), Technometrics 21:239
 */
export function latinHypercubeScores(count: number, seed: number, name: string): Float64Array {
  const low = seed % 0x1_0000_0000 | 0;
  const high = Math.floor(seed / 0x1_0000_0000) | 0;
  const generator = xoroshiro128plus(low ^ Math.imul(high, 0x9e3779b1) ^ hashName(name));
  const scores = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    // The middle of the last representable step keeps the score finite at both ends.
    const p = (i + uniform(generator)) / count;
    scores[i] = normalQuantile(Math.min(Math.max(p, 1e-16), 1 - 2 ** -53));
  }
  for (let i = count - 1; i > 0; i--) {
    const j = uniformInt(generator, 0, i);
    const held = scores[i]!;
    scores[i] = scores[j]!;
    scores[j] = held;
  }
  return scores;
}
