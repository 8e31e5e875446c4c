/** Changes three uniform quadratic B-spline values, `stride` apart from `at` on, to powers of t − ½ in place. */
function toPowers(values: Float64Array, at: number, stride: number): void {
  const c0 = values[at], c1 = values[at + stride], c2 = values[at + 2 * stride];
  const s = c0 + c2;
  values[at] = (s + 6 * c1) / 8;
  values[at + stride] = (c2 - c0) / 2;
  values[at + 2 * stride] = s / 2 - c1;
}

/** Changes a 3 × 3 B-spline net [(3 row + column) · 3 + axis] to coefficients of (u − ½)^i (v − ½)^j [(3 i + j) · 3 + axis], rows along u. */
export function biquadraticNetToPowers(net: Float64Array, powers: Float64Array): void {
  for (let i = 0; i < 27; i++) powers[i] = net[i];
  for (let axis = 0; axis < 3; axis++) {
    for (let i = 0; i < 3; i++) toPowers(powers, 9 * i + axis, 3);
    for (let j = 0; j < 3; j++) toPowers(powers, 3 * j + axis, 9);
  }
}
