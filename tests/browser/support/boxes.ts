export interface Box {
  asset: string;
  /** Edge lengths along x, y, z in centimetres. */
  size: [number, number, number];
  /** Centre in centimetres. */
  centre: [number, number, number];
}

/** Boxes of different sizes and places, their edges all sharp, so that the limit surface is the cuboid itself. */
export function boxes(count: number): Box[] {
  return Array.from({ length: count }, (_, index) => ({
    asset: `crate${String(index + 1).padStart(2, '0')}`,
    size: [10 + index, 20 + 2 * index, 35 + 3 * index],
    centre: [4 * index, 10 + index, -3 * index],
  }));
}

const QUADS = [
  [0, 2, 3, 1],
  [4, 5, 7, 6],
  [0, 1, 5, 4],
  [2, 6, 7, 3],
  [0, 4, 6, 2],
  [1, 3, 7, 5],
];
const EDGES = ['0 1', '2 3', '4 5', '6 7', '0 2', '1 3', '4 6', '5 7', '0 4', '1 5', '2 6', '3 7'];

/** The box as an OBJ cage. Corner k has its x, y and z bits for the far sides. */
export function boxObj({ size, centre }: Box): string {
  const corners = Array.from({ length: 8 }, (_, corner) =>
    [0, 1, 2].map((axis) => centre[axis] + (corner & (1 << axis) ? 0.5 : -0.5) * size[axis]).join(' '),
  );
  return [
    ...corners.map((corner) => `v ${corner}`),
    'g body',
    ...QUADS.map((quad) => `f ${quad.map((vertex) => vertex + 1).join(' ')}`),
    ...EDGES.map((edge) => `t crease 2/1/0 ${edge} 10`),
    '',
  ].join('\n');
}

/** Mass, centre of mass and principal moments of a uniform cuboid in SI: m = ρabc, I = m(b² + c²)/12 (any handbook of mechanics). */
export function boxMass({ size, centre }: Box, densityKgPerM3: number) {
  const [a, b, c] = size.map((edge) => edge / 100);
  const massKg = densityKgPerM3 * a * b * c;
  const moments = [(b * b + c * c) / 12, (a * a + c * c) / 12, (a * a + b * b) / 12].map((moment) => moment * massKg);
  return { volumeM3: a * b * c, massKg, comM: centre.map((place) => place / 100), principalKgM2: [...moments].sort((x, y) => x - y) };
}
