import { uniformInt } from "pure-rand/distribution/uniformInt";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { normalQuantile } from "./numeric";

/** FNV-1a, 32 bits: turns an input's name into a stream of its own. */
function hashName(name: string): number {
  let hash = 0x811c9dc5;
  for (let i = 0; i < name.length; i++) hash = Math.imul(hash ^ name.charCodeAt(i), 0x01000193);
  return hash | 0;
}

/** Spreads neighbouring seeds over all 32 bits (multiply, xor, shift, twice): the generator itself starts out close to its seed. */
function scatter(seed: number): number {
  let x = seed | 0;
  x = Math.imul(x ^ (x >>> 16), 0x7feb352d);
  x = Math.imul(x ^ (x >>> 15), 0x846ca68b);
  return x ^ (x >>> 16);
}
const WARM_UP = 16;

/** 53 random bits in [0, 1). */
const uniform = (generator: { next(): number }): number =>
  ((generator.next() >>> 5) * 0x400_0000 + (generator.next() >>> 6)) / 2 ** 53;

/**
 * One dimension of a Latin hypercube: each of `count` equal strata of [0, 1) holds exactly one point, in random order.
 * Every input has a stream of its own, named, so that the order of measures or packages changes no draw.
 * @param seed whole number ≥ 0
 * @see McKay, Beckman & Conover (1979), Technometrics 21:239
 */
export function latinHypercube(count: number, seed: number, name: string): Float64Array {
  const low = (seed % 0x1_0000_0000) | 0;
  const high = Math.floor(seed / 0x1_0000_0000) | 0;
  const generator = xoroshiro128plus(scatter(scatter(scatter(low) ^ high) ^ hashName(name)));
  for (let i = 0; i < WARM_UP; i++) generator.next();
  const points = new Float64Array(count);
  for (let i = 0; i < count; i++) points[i] = (i + uniform(generator)) / count;
  for (let i = count - 1; i > 0; i--) {
    const j = uniformInt(generator, 0, i);
    const held = points[i]!;
    points[i] = points[j]!;
    points[j] = held;
  }
  return points;
}

/** `latinHypercube` as standard normal scores. */
export function latinHypercubeScores(count: number, seed: number, name: string): Float64Array {
  // Kept off 0 and 1, where the score would be infinite.
  return latinHypercube(count, seed, name).map((p) => normalQuantile(Math.min(Math.max(p, 1e-16), 1 - 2 ** -53)));
}
