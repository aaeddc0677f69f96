/** A number as a sentence has it: 10,000,000,000. */
export const inWords = (value: number): string => value.toLocaleString("en-GB", { maximumFractionDigits: 10 });

/**
 * Quantile of an ascending sample, linear between order statistics (type 7 of Hyndman & Fan 1996, Am. Stat. 50:361).
 * @param sorted ascending, at least one value
 * @param p 0..1
 */
export function quantileSorted(sorted: Float64Array, p: number): number {
  const at = p * (sorted.length - 1);
  const below = Math.floor(at);
  const low = sorted[below]!;
  const high = sorted[Math.min(below + 1, sorted.length - 1)]!;
  return low + (at - below) * (high - low);
}

/**
 * Root of `f` in [low, high]: inverse quadratic interpolation where three points promise it, bisection elsewhere.
 * @param tolerance of x, absolute; that of the arithmetic is added to it
 * @throws RangeError where f has the same sign at both ends
 * @see Chandrupatla (1997), Advances in Engineering Software 28:145, for the test that chooses between the two
 */
export function findRoot(f: (x: number) => number, low: number, high: number, tolerance: number): number {
  // a is the newest point, b the other end of the bracket, c the point before.
  let a = high;
  let b = low;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) throw new RangeError("findRoot: no change of sign");
  let part = 0.5;
  for (let evaluation = 0; evaluation < 200; evaluation++) {
    const x = a + part * (b - a);
    const fx = f(x);
    let c = a;
    let fc = fa;
    if (fx > 0 !== fa > 0) {
      c = b;
      fc = fb;
      b = a;
      fb = fa;
    }
    a = x;
    fa = fx;
    const best = Math.abs(fa) < Math.abs(fb) ? a : b;
    const least = (2 * Number.EPSILON * Math.abs(best) + tolerance / 2) / Math.abs(b - a);
    if (fa === 0 || least > 0.5) return best;
    const xi = (a - b) / (c - b);
    const phi = (fa - fb) / (fc - fb);
    const smooth = phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi;
    const wanted = smooth ? (fa / (fb - fa)) * (fc / (fb - fc)) + (((c - a) / (b - a)) * fa * fb) / ((fc - fa) * (fc - fb)) : 0.5;
    part = Math.min(1 - least, Math.max(least, wanted));
  }
  return Math.abs(fa) < Math.abs(fb) ? a : b;
}

/**
 * Φ⁻¹: quantile of the standard normal distribution, relative error about 1e-16.
 * @param p strictly between 0 and 1
 * @see Wichura (1988), Algorithm AS 241 (PPND16), Appl. Stat. 37:477
 */
export function normalQuantile(p: number): number {
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (
      (q *
        (((((((2.5090809287301227e3 * r + 3.343057558358813e4) * r + 6.72657709270087e4) * r +
          4.592195393154987e4) * r + 1.373169376550946e4) * r + 1.9715909503065513e3) * r +
          1.3314166789178438e2) * r + 3.3871328727963665)) /
      (((((((5.226495278852546e3 * r + 2.8729085735721943e4) * r + 3.930789580009271e4) * r +
        2.1213794301586597e4) * r + 5.394196021424751e3) * r + 6.871870074920579e2) * r +
        4.231333070160091e1) * r + 1)
    );
  }
  let r = Math.sqrt(-Math.log(q < 0 ? p : 1 - p));
  let value: number;
  if (r <= 5) {
    r -= 1.6;
    value =
      (((((((7.745450142783414e-4 * r + 2.2723844989269184e-2) * r + 2.417807251774506e-1) * r +
        1.2704582524523684) * r + 3.6478483247632045) * r + 5.769497221460691) * r +
        4.630337846156546) * r + 1.4234371107496835) /
      (((((((1.0507500716444169e-9 * r + 5.475938084995345e-4) * r + 1.5198666563616457e-2) * r +
        1.4810397642748008e-1) * r + 6.897673349851e-1) * r + 1.6763848301838038) * r +
        2.053191626637759) * r + 1);
  } else {
    r -= 5;
    value =
      (((((((2.0103343992922881e-7 * r + 2.7115555687434876e-5) * r + 1.2426609473880784e-3) * r +
        2.6532189526576124e-2) * r + 2.9656057182850487e-1) * r + 1.7848265399172913) * r +
        5.463784911164114) * r + 6.657904643501103) /
      (((((((2.0442631033899397e-15 * r + 1.421511758316446e-7) * r + 1.8463183175100548e-5) * r +
        7.868691311456133e-4) * r + 1.4875361290850615e-2) * r + 1.369298809227358e-1) * r +
        5.99832206555888e-1) * r + 1);
  }
  return q < 0 ? -value : value;
}
