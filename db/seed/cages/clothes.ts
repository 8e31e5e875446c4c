import { CageDraft } from './cage-draft';
import { layHoop, layPlate } from './plates';
import type { Vec } from './vector';

/** A row of the cloak: height, how far it reaches around from the back (degrees), radii, middle, depth of its folds. */
interface CloakRow {
  part: string;
  y: number;
  reach: number;
  radii: readonly [number, number];
  z: number;
  folds: number;
}

const CLOAK: readonly CloakRow[] = [
  { part: 'hood', y: 171.5, reach: 122, radii: [0, 12], z: 0, folds: 0 },
  { part: 'hood', y: 165, reach: 122, radii: [10.5, 14.8], z: 0, folds: 0 },
  { part: 'hood', y: 156, reach: 126, radii: [12, 17.4], z: 0, folds: 0 },
  { part: 'hood', y: 147.5, reach: 132, radii: [11, 13.5], z: -1, folds: 0 },
  { part: 'mantle', y: 140, reach: 128, radii: [15, 13.5], z: -1, folds: 0.2 },
  { part: 'mantle', y: 133, reach: 108, radii: [24, 17], z: -4, folds: 0.5 },
  { part: 'mantle', y: 118, reach: 84, radii: [29, 19], z: -6, folds: 1 },
  { part: 'skirt', y: 100, reach: 80, radii: [33, 21], z: -7, folds: 1.8 },
  { part: 'skirt', y: 76, reach: 80, radii: [37, 24], z: -8, folds: 2.8 },
  { part: 'skirt', y: 50, reach: 80, radii: [41, 28], z: -9, folds: 3.6 },
  { part: 'skirt', y: 26, reach: 80, radii: [45, 32], z: -10, folds: 4.4 },
  { part: 'skirt', y: 9, reach: 80, radii: [48, 35], z: -10, folds: 5 },
];
const COLUMNS = 21;

/** The ferrywoman's cloak: one open sheet, its hood folded along the crown. */
export function cloak(): CageDraft {
  const draft = new CageDraft();
  const rows = CLOAK.map((row, r) =>
    Array.from({ length: COLUMNS }, (_, c) => {
      const share = (2 * c) / (COLUMNS - 1) - 1;
      const angle = (row.reach * share * Math.PI) / 180;
      const fold = row.folds * Math.cos(share * 5 * Math.PI);
      const at: Vec = [(row.radii[0] + fold) * Math.sin(angle), row.y, row.z - (row.radii[1] + fold) * Math.cos(angle)];
      return { at: r === 0 ? ([0, row.y - 1.5 * Math.cos(angle), at[2]] as const) : at };
    }),
  );
  const ridge = rows[0].slice(0, (COLUMNS + 1) / 2).map(({ at }) => draft.add(at));
  const grid = rows.map((row, r) => (r === 0 ? row.map((_, c) => ridge[Math.min(c, COLUMNS - 1 - c)]) : row.map(({ at }) => draft.add(at))));
  for (let r = 0; r + 1 < grid.length; r++) {
    for (let c = 0; c + 1 < COLUMNS; c++) draft.face(CLOAK[r].part, grid[r][c], grid[r][c + 1], grid[r + 1][c + 1], grid[r + 1][c]);
  }
  return draft;
}

const CLOTH = 0.5;

/** Height and radii (across, front to back) of a garment's section. */
type Section = readonly [number, number, number];

function tube(sections: readonly Section[], columns: number): Vec[][] {
  return sections.map(([y, across, deep]) =>
    Array.from({ length: columns }, (_, c): Vec => {
      const angle = (2 * Math.PI * c) / columns;
      return [across * Math.sin(angle), y, deep * Math.cos(angle)];
    }),
  );
}

/** The ringer's coat in closed thin pieces that stand off the body: skirted body, sleeves, collar, belt. */
export function coat(): CageDraft {
  const draft = new CageDraft();
  const body: Section[] = [[56, 31, 26], [70, 28, 23.5], [84, 25, 20.5], [96, 22.5, 17.5], [106, 21.5, 16.5], [116, 21.5, 16.2], [126, 21.8, 15.6], [131, 22, 15.2]];
  layPlate(draft, 'body', tube(body, 20), CLOTH, { around: true });
  layPlate(draft, 'collar', tube([[128.6, 28.6, 17.4], [133, 27, 16.4], [137.5, 24, 14.4], [141, 18, 12.4], [143.5, 12, 10.4], [147, 9.2, 9.2]], 20), CLOTH, { around: true });
  layHoop(draft, 'belt', { centre: [0, 104, 0], axis: [0, 1, 0], hint: [1, 0, 0], radii: [22.6, 17.6], width: 6, thickness: 0.6 });
  for (const side of [1, -1]) laySleeve(draft, side > 0 ? 'sleeve_L' : 'sleeve_R', side);
  return draft;
}

/** Stations of the ringer's arm: place and radius of the sleeve. */
const ARM: readonly (readonly [Vec, number])[] = [
  [[27.5, 128, -1.6], 8.2],
  [[31, 123.5, -1.9], 7.8],
  [[36, 117.5, -2.1], 7.2],
  [[41, 111, -1.9], 6.8],
  [[46, 105, -0.9], 6.6],
  [[52, 97, 0.8], 6.6],
];

function laySleeve(draft: CageDraft, part: string, side: number): void {
  const columns = 12;
  const grid = ARM.map(([at, radius]) =>
    Array.from({ length: columns }, (_, c): Vec => {
      const angle = (2 * Math.PI * c * side) / columns;
      // Square to an arm that falls by about fifty degrees.
      const across = radius * Math.cos(angle);
      return [side * (at[0] + across * 0.77), at[1] + across * 0.64, at[2] - radius * Math.sin(angle)];
    }),
  );
  layPlate(draft, part, grid, CLOTH, { around: true });
}
