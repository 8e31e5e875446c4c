/** Changes four B-spline control values, `stride` apart from `at` on, to powers of t − ½ in place. */
function toPowers(values: Float64Array, at: number, stride: number): void {
  const c0 = values[at], c1 = values[at + stride], c2 = values[at + 2 * stride], c3 = values[at + 3 * stride];
  const s1 = c1 + c2, t = c0 + c3 - s1, d0 = c3 - c0, d1 = c2 - c1;
  // (s0 + 23 s1)/48 through its difference from s1/2: the rounding of 1/48 then meets only what is curved.
  values[at] = s1 * (1 / 2) + t * (1 / 48);
  values[at + stride] = (d0 + 5 * d1) * (1 / 8);
  values[at + 2 * stride] = t * (1 / 4);
  values[at + 3 * stride] = (d0 - 3 * d1) * (1 / 6);
}

/** Changes a 4 × 4 B-spline net [(4 row + column) · 3 + axis] to coefficients of (u − ½)^i (v − ½)^j [(4 i + j) · 3 + axis], rows along u. */
export function netToPowers(net: Float64Array, powers: Float64Array): void {
  powers.set(net);
  for (let axis = 0; axis < 3; axis++) {
    for (let i = 0; i < 4; i++) toPowers(powers, 12 * i + axis, 3);
    for (let j = 0; j < 4; j++) toPowers(powers, 3 * j + axis, 12);
  }
}
