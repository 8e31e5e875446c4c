import { CageDraft } from './cage-draft';
import { closeTrunk, growTrunk, layTrunk, nearEnd } from './half-tube';
import { growLimb } from './rings';

/** A toad as long as an arm, with a throat that swells like a bell. */
export function toad(throat: number): CageDraft {
  const draft = new CageDraft();
  const trunk = layTrunk(
    draft,
    [
      { z: -30, y: 12, radii: [7, 6], part: 'body', towards: [0.15, 1] },
      { z: -26, y: 14, radii: [14, 11], part: 'body', towards: [0.2, 1] },
      { z: -17, y: 18, radii: [19, 15], part: 'body' },
      { z: -6, y: 21, radii: [22, 17], part: 'body' },
      { z: 5, y: 23, radii: [22, 17], part: 'body' },
      { z: 14, y: 25, radii: [19.5, 15], part: 'head' },
      { z: 20, y: 26.5, radii: [18.5, 12.5], part: 'head' },
      { z: 26, y: 27.5, radii: [17, 10], part: 'head', square: 1.15 },
      { z: 33, y: 26.5, radii: [13.5, 6.6], part: 'head', square: 1.2 },
      { z: 37, y: 25.5, radii: [8, 3.6], part: 'head', square: 1.2 },
    ],
    6,
    [
      { rows: [1, 3], columns: [2, 4] },
      { rows: [4, 6], columns: [2, 3] },
      { rows: [6, 7], columns: [4, 5] },
      { rows: [5, 7], columns: [0, 1] },
    ],
  );
  const [hind, fore, eye, sac] = trunk.openings;
  closeTrunk(draft, 'body', nearEnd(trunk), [0, 0, -1]);
  closeTrunk(draft, 'head', trunk.rows[trunk.rows.length - 1], [0, 0, 1]);
  growLimb(
    draft,
    eye,
    [
      { at: [11.3, 35.4, 23.5], radii: [4.3, 4.2], part: 'eye_L' },
      { at: [12, 37.6, 24.2], radii: [5, 4.9], part: 'eye_L' },
      { at: [12.7, 40, 24.8], radii: [4.4, 4.3], part: 'eye_L' },
      { at: [13.1, 41.8, 25.2], radii: [2, 2], part: 'eye_L' },
    ],
    { hint: [0, 0, 1], bulge: 0.8 },
  );
  growSac(draft, sac, throat);
  growLimb(
    draft,
    hind,
    [
      { at: [24, 17, -15], radii: [9.5, 8], part: 'thigh_L' },
      { at: [29, 19, -6], radii: [8, 7], part: 'thigh_L' },
      { at: [33, 21, 3], radii: [5.6, 5.2], part: 'thigh_L' },
      { at: [36, 18, 7], radii: [4.6, 4.4], part: 'thigh_L' },
      { at: [37, 11, 2], radii: [4.4, 4], part: 'thigh_L' },
      { at: [36, 5, -8], radii: [3.2, 3], part: 'thigh_L' },
      { at: [37, 2.6, -11], radii: [2.4, 3], part: 'hindfoot_L' },
      { at: [39, 1.8, -4], radii: [1.6, 4], part: 'hindfoot_L' },
      { at: [43, 1.4, 6], radii: [1.3, 6.5], part: 'hindfoot_L' },
      { at: [46, 1.2, 14], radii: [1, 8.5], part: 'hindfoot_L' },
    ],
    { hint: [0, 1, 0] },
  );
  growLimb(
    draft,
    fore,
    [
      { at: [22, 20, 12], radii: [5, 4.4], part: 'foreleg_L' },
      { at: [26, 14, 13], radii: [4.2, 3.8], part: 'foreleg_L' },
      { at: [27, 9, 16], radii: [3.6, 3.4], part: 'foreleg_L' },
      { at: [25, 4, 19], radii: [2.8, 2.8], part: 'foreleg_L' },
      { at: [24.5, 1.8, 22], radii: [3.4, 1.6], part: 'forefoot_L' },
      { at: [24, 1.2, 27], radii: [5, 1.1], part: 'forefoot_L' },
      { at: [23.5, 1, 31], radii: [4.6, 0.8], part: 'forefoot_L' },
    ],
    { hint: [1, 0, 0] },
  );
  draft.mirror();
  return draft;
}

function growSac(draft: CageDraft, start: number[], swell: number): void {
  const trunk = growTrunk(draft, start, 'throat', [
    { y: 13, z: 20, radii: [9 * swell, 9 * swell], part: 'throat', towards: [-1, 0.25] },
    { y: 8.5, z: 22, radii: [10.5 * swell, 10 * swell], part: 'throat', towards: [-1, 0.25] },
    { y: 3.5, z: 23.5, radii: [6 * swell, 6 * swell], part: 'throat', towards: [-1, 0.25] },
  ]);
  closeTrunk(draft, 'throat', trunk.rows[trunk.rows.length - 1], [0, -0.6, 0]);
}
