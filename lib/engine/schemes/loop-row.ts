import { AREA_TOLERANCE, coarseOf, NODE_RANGES } from '../kernel/node-choice';
import { PatchBlock, separateKernel } from '../kernel/patch-block';
import type { RegularPatches } from '../kernel/regular-patches';
import type { LimitSums } from '../moments/limit-sums';
import { ROW_NODES, rowRule, rowRuleDefect, SHORT_ROW } from '../moments/row-rule';
import { MOMENTS } from '../moments/sums';
import { mendSurface } from '../patches/mend-surface';
import { addRowShell } from './loop-row-shell';
import type { TriangleRow } from './loop-strip';

const NET = 36;
const nets = new Float64Array(4 * NET);
const net = new Float64Array(NET);
const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);

let block: PatchBlock | null = null;

/** Sums over a row, or over some of it, about a body's origin. */
interface RowSums {
  solid: Float64Array;
  /** Of the solid moments' moduli. */
  moduli: Float64Array;
  magnitude: number;
  surface: Float64Array;
  /** Estimated error of the area. */
  error: number;
}

/**
 * Adds rows of triangles along semi-sharp creases in a time that hardly depends on their length. The pieces' solid moments are polynomials along the row,
 * which a few nodes sum exactly. Areas hold a root: two rules are compared, and the row is halved where they differ by more than AREA_TOLERANCE of the
 * triangle, of which it is about one part in `count`.
 */
export class RowPatches {
  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(private readonly origins: Float64Array, private readonly sums: LimitSums) {}

  /** Adds a row; a short one goes piece by piece to `patches`. */
  add(body: number, row: TriangleRow, patches: RegularPatches): void {
    if (row.count <= SHORT_ROW) {
      for (let i = 0; i < row.count; i++) {
        row.fill(i, nets);
        for (let piece = 0; piece < row.pieces; piece++) patches.add(body, nets.subarray(NET * piece, NET * (piece + 1)));
      }
      return;
    }
    const { sums } = this;
    const { solid: moments, moduli, magnitude, surface: areas, error } = sumRange(row, 0, row.count, this.origins.subarray(3 * body, 3 * body + 3));
    sums.solid.add(body, moments, 0);
    sums.solid.magnitudes[body] += magnitude;
    const defect = rowRuleDefect(rowRule(ROW_NODES[0], row.count));
    for (let i = 0; i < MOMENTS; i++) sums.closingError[MOMENTS * body + i] += defect * moduli[i];
    sums.surface.add(body, areas, 0);
    sums.surfaceError[body] += error;
    if (sums.shells !== null) addRowShell(sums.shells, body, row, areas[0]);
  }
}

/** Sums the pieces at `count` places from `from` on. */
function sumRange(row: TriangleRow, from: number, count: number, origin: Float64Array): RowSums {
  if (count <= SHORT_ROW) return sumPieces(row, Float64Array.from({ length: count }, (_, i) => from + i), new Float64Array(count).fill(1), origin);
  const [sums, coarse] = ROW_NODES.map((nodes) => {
    const rule = rowRule(nodes, count);
    return sumPieces(row, rule.nodes.map((node) => from + node), rule.weights, origin);
  });
  const error = Math.abs(sums.surface[0] - coarse.surface[0]);
  if (error <= AREA_TOLERANCE * row.count * sums.surface[0]) {
    sums.error += error;
    return sums;
  }
  const half = count >> 1;
  const [first, second] = [sumRange(row, from, half, origin), sumRange(row, from + half, count - half, origin)];
  return { ...sums, surface: first.surface.map((value, i) => value + second.surface[i]), error: first.error + second.error };
}

/** Sums the pieces at the places `at` with weights. */
function sumPieces(row: TriangleRow, at: Float64Array, weights: Float64Array, [ox, oy, oz]: Float64Array): RowSums {
  const sums: RowSums = { solid: new Float64Array(MOMENTS), moduli: new Float64Array(MOMENTS), magnitude: 0, surface: new Float64Array(MOMENTS), error: 0 };
  const patches = (block ??= new PatchBlock(separateKernel('triangle')));
  const { pieces } = row;
  for (let k = 0; k < at.length; k++) {
    row.fill(at[k], nets);
    for (let piece = 0; piece < pieces; piece++) patches.put(pieces * k + piece, nets, ox, oy, oz, NET * piece);
  }
  const { exact } = NODE_RANGES.triangle;
  patches.run(pieces * at.length, exact, coarseOf('triangle', exact));
  for (let patch = 0; patch < pieces * at.length; patch++) {
    const weight = weights[Math.floor(patch / pieces)];
    sums.magnitude += weight * patches.read(patch, solid, surface);
    patches.net(patch, net);
    sums.error += weight * mendSurface('triangle', net, ox, oy, oz, surface, patches.coarseArea(patch), patches.areaError(patch));
    for (let i = 0; i < MOMENTS; i++) {
      sums.solid[i] += weight * solid[i];
      sums.moduli[i] += weight * Math.abs(solid[i]);
      sums.surface[i] += weight * surface[i];
    }
  }
  return sums;
}
