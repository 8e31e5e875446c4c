/**
 * Semi-axes of the solid ellipsoid with the same mass and principal moments, along principal axes 1, 2, 3:
 * I1 = m (b² + c²) / 5 and so on, hence a² = 5 (I2 + I3 − I1) / (2 m). Metres for kg and kg·m².
 * A moment at the edge of the triangle inequality gives a flat ellipsoid, never a negative square.
 */
export function equalEllipsoid(
  massKg: number,
  momentsKgM2: readonly [number, number, number],
): [number, number, number] {
  const [i1, i2, i3] = momentsKgM2;
  const semi = (sum: number) => Math.sqrt(Math.max(0, (5 * sum) / (2 * massKg)));
  return [semi(i2 + i3 - i1), semi(i3 + i1 - i2), semi(i1 + i2 - i3)];
}
