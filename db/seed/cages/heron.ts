import { CageDraft } from './cage-draft';
import { closeTrunk, layTrunk, nearEnd } from './half-tube';
import { growLimb } from './rings';

/** A hag in a heron's shape, as tall as a person: a bent neck, a long bill, half-open wings on stilts. */
export function heron(): CageDraft {
  const draft = new CageDraft();
  const trunk = layTrunk(
    draft,
    [
      { z: -62, y: 70, radii: [7, 1.6], part: 'tail', towards: [0.35, 1] },
      { z: -48, y: 75, radii: [7.5, 3], part: 'tail' },
      { z: -36, y: 80, radii: [8.5, 7], part: 'body' },
      { z: -22, y: 85, radii: [13.5, 13.5], part: 'body' },
      { z: -8, y: 90, radii: [16, 16.5], part: 'body' },
      { z: 8, y: 96, radii: [14.5, 16], part: 'body' },
      { z: 20, y: 102, radii: [10, 12], part: 'neck' },
      { z: 30, y: 111, radii: [6.4, 7], part: 'neck', towards: [1, 0.8] },
      { z: 36, y: 122, radii: [4.6, 5], part: 'neck', towards: [1, 0.1] },
      { z: 33, y: 133, radii: [4, 4.2], part: 'neckUpper', towards: [1, -0.5] },
      { z: 28, y: 143, radii: [3.7, 3.9], part: 'neckUpper', towards: [1, -0.2] },
      { z: 30, y: 153, radii: [4, 4.4], part: 'neckUpper', towards: [1, 0.6] },
      { z: 37, y: 159, radii: [5.4, 6], part: 'head', towards: [0.15, 1] },
      { z: 45, y: 159.5, radii: [5, 5.4], part: 'head', towards: [-0.15, 1] },
      { z: 52, y: 158, radii: [3.4, 3.6], part: 'beak', towards: [-0.2, 1] },
      { z: 66, y: 155, radii: [2, 2.2], part: 'beak', towards: [-0.2, 1] },
      { z: 88, y: 150, radii: [0.5, 0.6], part: 'beak', towards: [-0.25, 1] },
    ],
    6,
    [
      { rows: [4, 6], columns: [4, 5] },
      { rows: [3, 5], columns: [1, 2] },
    ],
  );
  const [wing, leg] = trunk.openings;
  closeTrunk(draft, 'tail', nearEnd(trunk), [0, -0.5, -2]);
  closeTrunk(draft, 'beak', trunk.rows[trunk.rows.length - 1], [0, -0.2, 1]);
  growLimb(
    draft,
    wing,
    [
      { at: [19, 103, 1], radii: [11, 4.2], part: 'upperWing_L' },
      { at: [32, 110, -3], radii: [13, 3], part: 'upperWing_L' },
      { at: [46, 114, -7], radii: [16, 2.4], part: 'upperWing_L' },
      { at: [60, 113, -8], radii: [18, 2], part: 'foreWing_L' },
      { at: [78, 109, -8], radii: [19, 1.7], part: 'foreWing_L' },
      { at: [92, 103, -12], radii: [18, 1.4], part: 'handWing_L' },
      { at: [110, 92, -22], radii: [14, 1.1], part: 'handWing_L' },
      { at: [124, 80, -34], radii: [7, 0.8], part: 'handWing_L' },
    ],
    { hint: [0, 0, 1] },
  );
  growLimb(
    draft,
    leg,
    [
      { at: [9, 70, -4], radii: [4.4, 5.6], part: 'thigh_L' },
      { at: [10, 60, 0], radii: [3.2, 4], part: 'thigh_L' },
      { at: [10.5, 51, 1], radii: [2, 2.2], part: 'thigh_L' },
      { at: [10.5, 47, 0.5], radii: [1.9, 2.1], part: 'shin_L' },
      { at: [11, 26, -6], radii: [1.4, 1.5], part: 'shin_L' },
      { at: [11, 8, -9], radii: [1.5, 1.6], part: 'shin_L' },
      { at: [11, 3, -8], radii: [2, 1.9], part: 'foot_L' },
      { at: [11.4, 1.6, -2], radii: [3.4, 1.3], part: 'foot_L' },
      { at: [11.8, 1, 7], radii: [6, 0.9], part: 'foot_L' },
      { at: [12, 0.8, 13], radii: [7, 0.7], part: 'foot_L' },
    ],
    { hint: [1, 0, 0] },
  );
  draft.mirror();
  return draft;
}
