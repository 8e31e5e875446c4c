import type { CageDraft } from './cage-draft';
import { cageRadius, crossFrame } from './rings';
import { add, cross, subtract, times, unit, type Vec } from './vector';

export interface PlateOptions {
  /** Columns join around, as in a sleeve. */
  around?: boolean;
  /** Crisp rim. */
  sharpRim?: boolean;
}

/**
 * A thin closed plate over a grid of points: an outer side where the grid lies, an inner one `thickness` below, a rim between them.
 * The outside is where (along a row) × (from row to row) points.
 */
export function layPlate(draft: CageDraft, part: string, grid: readonly (readonly Vec[])[], thickness: number, { around = false, sharpRim = false }: PlateOptions = {}): void {
  const rows = grid.length;
  const columns = grid[0].length;
  const outer = grid.map((row) => row.map((point) => draft.add(point)));
  const inner = grid.map((row, r) => row.map((point, c) => draft.add(add(point, times(gridNormal(grid, r, c, around), -thickness)))));
  const spans = around ? columns : columns - 1;
  const next = (c: number) => (c + 1) % columns;
  for (let r = 0; r + 1 < rows; r++) {
    for (let c = 0; c < spans; c++) {
      draft.face(part, outer[r][c], outer[r][next(c)], outer[r + 1][next(c)], outer[r + 1][c]);
      draft.face(part, inner[r][c], inner[r + 1][c], inner[r + 1][next(c)], inner[r][next(c)]);
    }
  }
  for (let c = 0; c < spans; c++) {
    draft.face(part, outer[0][c], inner[0][c], inner[0][next(c)], outer[0][next(c)]);
    draft.face(part, outer[rows - 1][c], outer[rows - 1][next(c)], inner[rows - 1][next(c)], inner[rows - 1][c]);
  }
  if (!around) {
    for (let r = 0; r + 1 < rows; r++) {
      draft.face(part, outer[r][0], outer[r + 1][0], inner[r + 1][0], inner[r][0]);
      draft.face(part, outer[r][columns - 1], inner[r][columns - 1], inner[r + 1][columns - 1], outer[r + 1][columns - 1]);
    }
  }
  if (!sharpRim) return;
  for (const side of [outer, inner]) {
    for (let c = 0; c < spans; c++) for (const r of [0, rows - 1]) draft.sharpen(side[r][c], side[r][next(c)]);
    if (!around) for (let r = 0; r + 1 < rows; r++) for (const c of [0, columns - 1]) draft.sharpen(side[r][c], side[r + 1][c]);
  }
}

/** Outward normal of a grid at a point, from its neighbours. */
function gridNormal(grid: readonly (readonly Vec[])[], r: number, c: number, around: boolean): Vec {
  const rows = grid.length;
  const columns = grid[0].length;
  const before = around ? (c + columns - 1) % columns : Math.max(c - 1, 0);
  const after = around ? (c + 1) % columns : Math.min(c + 1, columns - 1);
  const alongColumn = subtract(grid[r][after], grid[r][before]);
  const alongRow = subtract(grid[Math.min(r + 1, rows - 1)][c], grid[Math.max(r - 1, 0)][c]);
  return unit(cross(alongColumn, alongRow));
}

export interface HoopShape {
  centre: Vec;
  axis: Vec;
  /** Direction of the first radius, square to the axis or nearly. */
  hint: Vec;
  radii: readonly [number, number];
  width: number;
  thickness: number;
  /** Radii at the far end of the axis beside those at the near end. */
  flare?: number;
}

const HOOP_SIDES = 16;

/** A crisp band around an axis: a strap, a tyre, a cuff. */
export function layHoop(draft: CageDraft, part: string, { centre, axis, hint, radii, width, thickness, flare = 1 }: HoopShape): void {
  const direction = unit(axis);
  const [e1, e2] = crossFrame(direction, hint);
  const grow = cageRadius(HOOP_SIDES);
  const grid = [-0.5, 0, 0.5].map((step) => {
    const widen = 1 + (flare - 1) * (step + 0.5);
    return Array.from({ length: HOOP_SIDES }, (_, i): Vec => {
      const angle = (2 * Math.PI * (i + 0.5)) / HOOP_SIDES;
      const across = add(times(e1, radii[0] * grow * widen * Math.cos(angle)), times(e2, radii[1] * grow * widen * Math.sin(angle)));
      return add(add(centre, times(direction, step * width)), across);
    });
  });
  layPlate(draft, part, grid, thickness, { around: true, sharpRim: true });
}
