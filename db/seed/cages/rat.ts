import { CageDraft } from './cage-draft';
import { closeTrunk, layTrunk, nearEnd } from './half-tube';
import { growLimb } from './rings';
import { layRope } from './solids';

/** A mill rat of half a metre. The lower hind legs are pieces of their own, hung under the thighs as a puppet's are. */
export function rat(): CageDraft {
  const draft = new CageDraft();
  const trunk = layTrunk(
    draft,
    [
      { z: -66, y: 3.2, radii: [0.45, 0.45], part: 'tailTip', towards: [0.3, 1] },
      { z: -56, y: 2.2, radii: [0.8, 0.8], part: 'tailTip', towards: [-0.1, 1] },
      { z: -44, y: 2.4, radii: [1.1, 1.1], part: 'tail', towards: [0.1, 1] },
      { z: -32, y: 5, radii: [1.5, 1.5], part: 'tail' },
      { z: -24, y: 8.4, radii: [2.2, 2.2], part: 'tail' },
      { z: -20, y: 10, radii: [4.4, 4.6], part: 'torso' },
      { z: -14, y: 11.6, radii: [7.2, 7.6], part: 'torso' },
      { z: -6, y: 12.6, radii: [8, 8.8], part: 'torso' },
      { z: 2, y: 12.4, radii: [7, 8], part: 'torso' },
      { z: 9, y: 12.2, radii: [5.6, 6.4], part: 'torso' },
      { z: 14, y: 13, radii: [4.6, 5.2], part: 'head' },
      { z: 19, y: 13.8, radii: [4.6, 4.8], part: 'head' },
      { z: 24, y: 13.2, radii: [3.7, 3.8], part: 'head' },
      { z: 29, y: 12, radii: [2.3, 2.5], part: 'head' },
      { z: 33, y: 11.2, radii: [1.2, 1.3], part: 'head' },
    ],
    6,
    [
      { rows: [5, 7], columns: [1, 3] },
      { rows: [8, 10], columns: [1, 2] },
      { rows: [11, 12], columns: [4, 5] },
    ],
  );
  const [hind, fore, ear] = trunk.openings;
  closeTrunk(draft, 'tailTip', nearEnd(trunk), [0, 0, -0.3]);
  closeTrunk(draft, 'head', trunk.rows[trunk.rows.length - 1], [0, 0, 0.4]);
  growLimb(
    draft,
    ear,
    [
      { at: [3.8, 18.6, 19.6], radii: [1.2, 0.9], part: 'ear_L' },
      { at: [5.2, 20.6, 19], radii: [2.6, 0.5], part: 'ear_L' },
      { at: [6.6, 23, 18.4], radii: [3, 0.4], part: 'ear_L' },
      { at: [7.6, 25.4, 18], radii: [1.7, 0.3], part: 'ear_L' },
    ],
    { hint: [0.86, -0.5, 0] },
  );
  growLimb(
    draft,
    fore,
    [
      { at: [5.2, 7, 8], radii: [1.7, 2.2], part: 'foreleg_L' },
      { at: [5.4, 4.4, 7.4], radii: [1.3, 1.6], part: 'foreleg_L' },
      { at: [5.4, 2.2, 9], radii: [1, 1.1], part: 'foreleg_L' },
      { at: [5.5, 1, 11], radii: [1.3, 0.8], part: 'forefoot_L' },
      { at: [5.6, 0.7, 13.6], radii: [1.7, 0.55], part: 'forefoot_L' },
    ],
    { hint: [1, 0, 0] },
  );
  growLimb(
    draft,
    hind,
    [
      { at: [8, 9, -10.5], radii: [2.6, 5], part: 'thigh_L' },
      { at: [8.6, 6.8, -8], radii: [2.2, 4], part: 'thigh_L' },
      { at: [8.8, 5.3, -4.6], radii: [1.3, 1.7], part: 'thigh_L' },
      { at: [8.9, 4.5, -3.6], radii: [1, 1.2], part: 'thigh_L' },
    ],
    { hint: [1, 0, 0], bulge: 0.3 },
  );
  layRope(
    draft,
    'shin_L',
    [[8.9, 3.2, -2.6], [8.9, 2.6, -6.4], [8.9, 1.8, -11.2], [8.9, 1.2, -12.8], [9, 0.9, -10], [9.2, 0.7, -5.6], [9.3, 0.6, -2.4]],
    { radius: [0.9, 1.15, 1.05, 1.05, 1.2, 1.4, 1], sides: 8, hint: [1, 0, 0], flat: 0.6 },
  );
  draft.mirror();
  return draft;
}
