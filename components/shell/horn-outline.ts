type Point = readonly [number, number];

/** Control polygon of a tapered horn lying along x, closed, clockwise on screen (y down); arbitrary lengths. */
export const HORN_CAGE: readonly Point[] = [
  [0, -50],
  [0, 62],
  [150, 84],
  [310, 62],
  [430, -30],
  [486, -176],
  [470, -184],
  [380, -78],
  [270, -22],
  [140, -40],
];

/** Cubic Bézier corners of the uniform cubic B-spline of a closed polygon: the limit curve of its subdivision. */
function pieces(cage: readonly Point[]): Point[][] {
  const at = (index: number) => cage[(index + cage.length) % cage.length];
  const mix = (parts: readonly (readonly [Point, number])[]): Point => [
    parts.reduce((sum, [point, weight]) => sum + weight * point[0], 0),
    parts.reduce((sum, [point, weight]) => sum + weight * point[1], 0),
  ];
  return cage.map((_, i) => [
    mix([
      [at(i - 1), 1 / 6],
      [at(i), 4 / 6],
      [at(i + 1), 1 / 6],
    ]),
    mix([
      [at(i), 2 / 3],
      [at(i + 1), 1 / 3],
    ]),
    mix([
      [at(i), 1 / 3],
      [at(i + 1), 2 / 3],
    ]),
    mix([
      [at(i), 1 / 6],
      [at(i + 1), 4 / 6],
      [at(i + 2), 1 / 6],
    ]),
  ]);
}

/** The limit curve as an SVG path. */
export function limitPath(cage: readonly Point[]): string {
  const number = (value: number) => value.toFixed(2);
  const [first] = pieces(cage);
  const start = `M${number(first[0][0])} ${number(first[0][1])}`;
  const curves = pieces(cage).map(([, b, c, d]) => `C${[b, c, d].flat().map(number).join(' ')}`);
  return `${start}${curves.join('')}Z`;
}

export function cagePath(cage: readonly Point[]): string {
  return `M${cage.map(([x, y]) => `${x} ${y}`).join('L')}Z`;
}

/**
 * Centroid, radius of gyration along x and extent along x of the area inside the limit curve, rounded to hundredths
 * so that server and browser write the same digits.
 */
export function balanceOf(cage: readonly Point[], samples = 24) {
  const outline = pieces(cage).flatMap(([a, b, c, d]) =>
    Array.from({ length: samples }, (_, k): Point => {
      const t = k / samples;
      const s = 1 - t;
      const value = (axis: 0 | 1) =>
        s * s * s * a[axis] + 3 * s * s * t * b[axis] + 3 * s * t * t * c[axis] + t * t * t * d[axis];
      return [value(0), value(1)];
    }),
  );
  let area = 0;
  let firstX = 0;
  let firstY = 0;
  let secondX = 0;
  outline.forEach(([x, y], i) => {
    const [u, v] = outline[(i + 1) % outline.length];
    const cross = x * v - u * y;
    area += cross / 2;
    firstX += (cross * (x + u)) / 6;
    firstY += (cross * (y + v)) / 6;
    secondX += (cross * (x * x + x * u + u * u)) / 12;
  });
  const centre = firstX / area;
  const abscissas = outline.map(([x]) => x);
  const rounded = (value: number) => Math.round(value * 100) / 100;
  return {
    centre: rounded(centre),
    height: rounded(firstY / area),
    gyration: rounded(Math.sqrt(secondX / area - centre * centre)),
    from: rounded(Math.min(...abscissas)),
    to: rounded(Math.max(...abscissas)),
  };
}
