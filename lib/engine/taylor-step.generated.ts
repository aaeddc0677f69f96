// Written by generate-taylor-step.ts; don't edit.
export const TAYLOR_ORDER = 14;

/**
 * One step of order 14, with a latent stage; advances y in place. Shares of the population, days.
 * @param y [susceptible, latent, infectious]
 * @param c receives the Taylor coefficients of the infectious share about the step's start
 * @returns days stepped, at most hMax
 */
export function stepWithLatent(y: Float64Array, c: Float64Array, beta: number, sigma: number, gamma: number, hMax: number, tolerance: number): number {
  const s0 = y[0]!, e0 = y[1]!, i0 = y[2]!;
  const n0 = beta * (s0 * i0);
  const s1 = -n0;
  const o0 = sigma * e0;
  const e1 = (n0 - o0);
  const i1 = (o0 - gamma * i0);
  const n1 = beta * (s0 * i1 + s1 * i0);
  const s2 = -n1 * 0.5;
  const o1 = sigma * e1;
  const e2 = (n1 - o1) * 0.5;
  const i2 = (o1 - gamma * i1) * 0.5;
  const n2 = beta * (s0 * i2 + s1 * i1 + s2 * i0);
  const s3 = -n2 * 0.3333333333333333;
  const o2 = sigma * e2;
  const e3 = (n2 - o2) * 0.3333333333333333;
  const i3 = (o2 - gamma * i2) * 0.3333333333333333;
  const n3 = beta * (s0 * i3 + s1 * i2 + s2 * i1 + s3 * i0);
  const s4 = -n3 * 0.25;
  const o3 = sigma * e3;
  const e4 = (n3 - o3) * 0.25;
  const i4 = (o3 - gamma * i3) * 0.25;
  const n4 = beta * (s0 * i4 + s1 * i3 + s2 * i2 + s3 * i1 + s4 * i0);
  const s5 = -n4 * 0.2;
  const o4 = sigma * e4;
  const e5 = (n4 - o4) * 0.2;
  const i5 = (o4 - gamma * i4) * 0.2;
  const n5 = beta * (s0 * i5 + s1 * i4 + s2 * i3 + s3 * i2 + s4 * i1 + s5 * i0);
  const s6 = -n5 * 0.16666666666666666;
  const o5 = sigma * e5;
  const e6 = (n5 - o5) * 0.16666666666666666;
  const i6 = (o5 - gamma * i5) * 0.16666666666666666;
  const n6 = beta * (s0 * i6 + s1 * i5 + s2 * i4 + s3 * i3 + s4 * i2 + s5 * i1 + s6 * i0);
  const s7 = -n6 * 0.14285714285714285;
  const o6 = sigma * e6;
  const e7 = (n6 - o6) * 0.14285714285714285;
  const i7 = (o6 - gamma * i6) * 0.14285714285714285;
  const n7 = beta * (s0 * i7 + s1 * i6 + s2 * i5 + s3 * i4 + s4 * i3 + s5 * i2 + s6 * i1 + s7 * i0);
  const s8 = -n7 * 0.125;
  const o7 = sigma * e7;
  const e8 = (n7 - o7) * 0.125;
  const i8 = (o7 - gamma * i7) * 0.125;
  const n8 = beta * (s0 * i8 + s1 * i7 + s2 * i6 + s3 * i5 + s4 * i4 + s5 * i3 + s6 * i2 + s7 * i1 + s8 * i0);
  const s9 = -n8 * 0.1111111111111111;
  const o8 = sigma * e8;
  const e9 = (n8 - o8) * 0.1111111111111111;
  const i9 = (o8 - gamma * i8) * 0.1111111111111111;
  const n9 = beta * (s0 * i9 + s1 * i8 + s2 * i7 + s3 * i6 + s4 * i5 + s5 * i4 + s6 * i3 + s7 * i2 + s8 * i1 + s9 * i0);
  const s10 = -n9 * 0.1;
  const o9 = sigma * e9;
  const e10 = (n9 - o9) * 0.1;
  const i10 = (o9 - gamma * i9) * 0.1;
  const n10 = beta * (s0 * i10 + s1 * i9 + s2 * i8 + s3 * i7 + s4 * i6 + s5 * i5 + s6 * i4 + s7 * i3 + s8 * i2 + s9 * i1 + s10 * i0);
  const s11 = -n10 * 0.09090909090909091;
  const o10 = sigma * e10;
  const e11 = (n10 - o10) * 0.09090909090909091;
  const i11 = (o10 - gamma * i10) * 0.09090909090909091;
  const n11 = beta * (s0 * i11 + s1 * i10 + s2 * i9 + s3 * i8 + s4 * i7 + s5 * i6 + s6 * i5 + s7 * i4 + s8 * i3 + s9 * i2 + s10 * i1 + s11 * i0);
  const s12 = -n11 * 0.08333333333333333;
  const o11 = sigma * e11;
  const e12 = (n11 - o11) * 0.08333333333333333;
  const i12 = (o11 - gamma * i11) * 0.08333333333333333;
  const n12 = beta * (s0 * i12 + s1 * i11 + s2 * i10 + s3 * i9 + s4 * i8 + s5 * i7 + s6 * i6 + s7 * i5 + s8 * i4 + s9 * i3 + s10 * i2 + s11 * i1 + s12 * i0);
  const s13 = -n12 * 0.07692307692307693;
  const o12 = sigma * e12;
  const e13 = (n12 - o12) * 0.07692307692307693;
  const i13 = (o12 - gamma * i12) * 0.07692307692307693;
  const n13 = beta * (s0 * i13 + s1 * i12 + s2 * i11 + s3 * i10 + s4 * i9 + s5 * i8 + s6 * i7 + s7 * i6 + s8 * i5 + s9 * i4 + s10 * i3 + s11 * i2 + s12 * i1 + s13 * i0);
  const s14 = -n13 * 0.07142857142857142;
  const o13 = sigma * e13;
  const e14 = (n13 - o13) * 0.07142857142857142;
  const i14 = (o13 - gamma * i13) * 0.07142857142857142;
  const last = Math.max(Math.abs(s14) / s0, (Math.abs(e14) + Math.abs(i14)) / (e0 + i0));
  const before = Math.max(Math.abs(s13) / s0, (Math.abs(e13) + Math.abs(i13)) / (e0 + i0));
  let h = Math.exp(Math.min(Math.log(tolerance / last) / 14, Math.log(tolerance / before) / 13));
  if (!(h < hMax)) h = hMax;
  y[0] = s0 + h * (s1 + h * (s2 + h * (s3 + h * (s4 + h * (s5 + h * (s6 + h * (s7 + h * (s8 + h * (s9 + h * (s10 + h * (s11 + h * (s12 + h * (s13 + h * s14)))))))))))));
  y[1] = e0 + h * (e1 + h * (e2 + h * (e3 + h * (e4 + h * (e5 + h * (e6 + h * (e7 + h * (e8 + h * (e9 + h * (e10 + h * (e11 + h * (e12 + h * (e13 + h * e14)))))))))))));
  y[2] = i0 + h * (i1 + h * (i2 + h * (i3 + h * (i4 + h * (i5 + h * (i6 + h * (i7 + h * (i8 + h * (i9 + h * (i10 + h * (i11 + h * (i12 + h * (i13 + h * i14)))))))))))));
  c[0] = i0;
  c[1] = i1;
  c[2] = i2;
  c[3] = i3;
  c[4] = i4;
  c[5] = i5;
  c[6] = i6;
  c[7] = i7;
  c[8] = i8;
  c[9] = i9;
  c[10] = i10;
  c[11] = i11;
  c[12] = i12;
  c[13] = i13;
  c[14] = i14;
  return h;
}

/**
 * One step of order 14, without a latent stage; advances y in place. Shares of the population, days.
 * @param y [susceptible, 0, infectious]
 * @param c receives the Taylor coefficients of the infectious share about the step's start
 * @returns days stepped, at most hMax
 */
export function stepWithoutLatent(y: Float64Array, c: Float64Array, beta: number, sigma: number, gamma: number, hMax: number, tolerance: number): number {
  const s0 = y[0]!, i0 = y[2]!;
  const n0 = beta * (s0 * i0);
  const s1 = -n0;
  const i1 = (n0 - gamma * i0);
  const n1 = beta * (s0 * i1 + s1 * i0);
  const s2 = -n1 * 0.5;
  const i2 = (n1 - gamma * i1) * 0.5;
  const n2 = beta * (s0 * i2 + s1 * i1 + s2 * i0);
  const s3 = -n2 * 0.3333333333333333;
  const i3 = (n2 - gamma * i2) * 0.3333333333333333;
  const n3 = beta * (s0 * i3 + s1 * i2 + s2 * i1 + s3 * i0);
  const s4 = -n3 * 0.25;
  const i4 = (n3 - gamma * i3) * 0.25;
  const n4 = beta * (s0 * i4 + s1 * i3 + s2 * i2 + s3 * i1 + s4 * i0);
  const s5 = -n4 * 0.2;
  const i5 = (n4 - gamma * i4) * 0.2;
  const n5 = beta * (s0 * i5 + s1 * i4 + s2 * i3 + s3 * i2 + s4 * i1 + s5 * i0);
  const s6 = -n5 * 0.16666666666666666;
  const i6 = (n5 - gamma * i5) * 0.16666666666666666;
  const n6 = beta * (s0 * i6 + s1 * i5 + s2 * i4 + s3 * i3 + s4 * i2 + s5 * i1 + s6 * i0);
  const s7 = -n6 * 0.14285714285714285;
  const i7 = (n6 - gamma * i6) * 0.14285714285714285;
  const n7 = beta * (s0 * i7 + s1 * i6 + s2 * i5 + s3 * i4 + s4 * i3 + s5 * i2 + s6 * i1 + s7 * i0);
  const s8 = -n7 * 0.125;
  const i8 = (n7 - gamma * i7) * 0.125;
  const n8 = beta * (s0 * i8 + s1 * i7 + s2 * i6 + s3 * i5 + s4 * i4 + s5 * i3 + s6 * i2 + s7 * i1 + s8 * i0);
  const s9 = -n8 * 0.1111111111111111;
  const i9 = (n8 - gamma * i8) * 0.1111111111111111;
  const n9 = beta * (s0 * i9 + s1 * i8 + s2 * i7 + s3 * i6 + s4 * i5 + s5 * i4 + s6 * i3 + s7 * i2 + s8 * i1 + s9 * i0);
  const s10 = -n9 * 0.1;
  const i10 = (n9 - gamma * i9) * 0.1;
  const n10 = beta * (s0 * i10 + s1 * i9 + s2 * i8 + s3 * i7 + s4 * i6 + s5 * i5 + s6 * i4 + s7 * i3 + s8 * i2 + s9 * i1 + s10 * i0);
  const s11 = -n10 * 0.09090909090909091;
  const i11 = (n10 - gamma * i10) * 0.09090909090909091;
  const n11 = beta * (s0 * i11 + s1 * i10 + s2 * i9 + s3 * i8 + s4 * i7 + s5 * i6 + s6 * i5 + s7 * i4 + s8 * i3 + s9 * i2 + s10 * i1 + s11 * i0);
  const s12 = -n11 * 0.08333333333333333;
  const i12 = (n11 - gamma * i11) * 0.08333333333333333;
  const n12 = beta * (s0 * i12 + s1 * i11 + s2 * i10 + s3 * i9 + s4 * i8 + s5 * i7 + s6 * i6 + s7 * i5 + s8 * i4 + s9 * i3 + s10 * i2 + s11 * i1 + s12 * i0);
  const s13 = -n12 * 0.07692307692307693;
  const i13 = (n12 - gamma * i12) * 0.07692307692307693;
  const n13 = beta * (s0 * i13 + s1 * i12 + s2 * i11 + s3 * i10 + s4 * i9 + s5 * i8 + s6 * i7 + s7 * i6 + s8 * i5 + s9 * i4 + s10 * i3 + s11 * i2 + s12 * i1 + s13 * i0);
  const s14 = -n13 * 0.07142857142857142;
  const i14 = (n13 - gamma * i13) * 0.07142857142857142;
  const last = Math.max(Math.abs(s14) / s0, (Math.abs(i14)) / (i0));
  const before = Math.max(Math.abs(s13) / s0, (Math.abs(i13)) / (i0));
  let h = Math.exp(Math.min(Math.log(tolerance / last) / 14, Math.log(tolerance / before) / 13));
  if (!(h < hMax)) h = hMax;
  y[0] = s0 + h * (s1 + h * (s2 + h * (s3 + h * (s4 + h * (s5 + h * (s6 + h * (s7 + h * (s8 + h * (s9 + h * (s10 + h * (s11 + h * (s12 + h * (s13 + h * s14)))))))))))));
  y[2] = i0 + h * (i1 + h * (i2 + h * (i3 + h * (i4 + h * (i5 + h * (i6 + h * (i7 + h * (i8 + h * (i9 + h * (i10 + h * (i11 + h * (i12 + h * (i13 + h * i14)))))))))))));
  c[0] = i0;
  c[1] = i1;
  c[2] = i2;
  c[3] = i3;
  c[4] = i4;
  c[5] = i5;
  c[6] = i6;
  c[7] = i7;
  c[8] = i8;
  c[9] = i9;
  c[10] = i10;
  c[11] = i11;
  c[12] = i12;
  c[13] = i13;
  c[14] = i14;
  return h;
}
