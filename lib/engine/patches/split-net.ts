import type { PatchKind } from '../kernel/patch-kinds';
import { RowBuilder, type SparseRows } from '../schemes/sparse-rows';
import { TRIANGLE_NET } from './box-spline';

/** Weights that make of the control values of a uniform B-spline segment those of its two halves: knots inserted in the middles. */
const CUBIC_HALVES = [[4, 4, 0, 0], [1, 6, 1, 0], [0, 4, 4, 0], [0, 1, 6, 1], [0, 0, 4, 4]].map((row) => row.map((weight) => weight / 8));
const QUADRATIC_HALVES = [[3, 1, 0], [1, 3, 0], [0, 3, 1], [0, 1, 3]].map((row) => row.map((weight) => weight / 4));

const made = new Map<PatchKind, SparseRows>();

/** The matrix that makes of a patch's net the four of its quarters, one after the other. */
export function splitMatrix(kind: PatchKind): SparseRows {
  let matrix = made.get(kind);
  if (matrix === undefined) {
    matrix = kind === 'triangle' ? splitTriangle() : splitSquare(kind === 'bicubic' ? CUBIC_HALVES : QUADRATIC_HALVES);
    made.set(kind, matrix);
  }
  return matrix;
}

/** Quarter 2 i + j has the i-th half along the rows and the j-th along the columns. */
function splitSquare(halves: readonly (readonly number[])[]): SparseRows {
  const size = halves.length - 1;
  const rows = new RowBuilder(4 * size * size);
  for (let quarter = 0; quarter < 4; quarter++) {
    for (let i = 0; i < size * size; i++) {
      const along = halves[Math.floor(i / size) + (quarter >> 1)];
      const across = halves[(i % size) + (quarter & 1)];
      rows.set(size * size * quarter + i, along.flatMap((a) => across.map((b) => a * b)));
    }
  }
  return rows.finish(Array.from({ length: 4 * size * size }, (_, i) => i));
}

/** Corner of each quarter on the finer lattice, and 1 or −1 for the middle one, which stands on its head. */
const QUARTERS: readonly (readonly [a: number, b: number, sign: number])[] = [[0, 0, 1], [1, 0, 1], [0, 1, 1], [1, 1, -1]];

/** Loop's rule in the regular lattice: the point a, b of the finer lattice from those of the coarser one. */
function splitTriangle(): SparseRows {
  const rows = new RowBuilder(48);
  QUARTERS.forEach(([a0, b0, sign], quarter) => {
    TRIANGLE_NET.forEach(([x, y], i) => {
      const a = a0 + sign * x, b = b0 + sign * y;
      const row = new Array<number>(12).fill(0);
      const add = (p: number, q: number, weight: number): void => {
        row[TRIANGLE_NET.findIndex(([c, d]) => c === p && d === q)] += weight;
      };
      const p = Math.floor(a / 2), q = Math.floor(b / 2);
      if (a % 2 === 0 && b % 2 === 0) {
        add(p, q, 10 / 16);
        for (const [c, d] of [[1, 0], [0, 1], [-1, 1], [-1, 0], [0, -1], [1, -1]]) add(p + c, q + d, 1 / 16);
      } else {
        // Ends of the edge, then the corners opposite to it.
        const edge = b % 2 === 0 ? [[0, 0], [1, 0], [0, 1], [1, -1]] : a % 2 === 0 ? [[0, 0], [0, 1], [1, 0], [-1, 1]] : [[1, 0], [0, 1], [0, 0], [1, 1]];
        edge.forEach(([c, d], k) => add(p + c, q + d, k < 2 ? 3 / 8 : 1 / 8));
      }
      rows.set(12 * quarter + i, row);
    });
  });
  return rows.finish(Array.from({ length: 48 }, (_, i) => i));
}
