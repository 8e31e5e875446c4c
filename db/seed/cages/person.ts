import { CageDraft } from './cage-draft';
import { closeTrunk, forkTrunk, growTrunk, layTrunk, nearEnd, type HalfRing, type Opening, type TrunkStation } from './half-tube';
import { growLimb, type LimbStation } from './rings';
import { times } from './vector';

export interface Build {
  /** Standing height, cm. */
  height: number;
  hips: number;
  waist: number;
  chest: number;
  shoulders: number;
  limbs: number;
  /** How far a beard (or a chin) stands forward, cm. */
  chin: number;
  /** Hair tied in a bun. */
  bun: boolean;
}

/** Height of the figure before it is scaled. */
const DRAWN = 180;
/** Faces of the head that the bun grows from. */
const NAPE: Opening = { rows: [12, 14], columns: [4, 5] };

/** A standing person with arms held away from the body: trunk, head, arms and legs on one skin. */
export function person(build: Build): CageDraft {
  const draft = new CageDraft();
  const trunk = layTrunk(draft, trunkStations(build), 5, [{ rows: [5, 7], columns: [2, 3] }, ...(build.bun ? [NAPE] : [])]);
  closeTrunk(draft, 'head', trunk.rows[trunk.rows.length - 1], [0, 0.6, 0]);
  growLimb(draft, forkTrunk(draft, nearEnd(trunk), [0, -1.5, 0]), leg(build.limbs), { hint: [1, 0, 0] });
  growLimb(draft, trunk.openings[0], arm(build), { hint: [0, 0, 1] });
  if (build.bun) growBun(draft, trunk.openings[1]);
  draft.mirror();
  draft.reshape((point) => times(point, build.height / DRAWN));
  return draft;
}

function trunkStations({ hips, waist, chest, shoulders, chin }: Build): TrunkStation[] {
  const up = { towards: [1, 0] } as const;
  return [
    { y: 83, z: -1, radii: [15.5 * hips, 10 * hips], part: 'hips', ...up },
    { y: 92, z: -1, radii: [17 * hips, 11.2 * hips], part: 'hips', ...up },
    { y: 101, z: 0, radii: [15 * hips, 10 * waist], part: 'hips', ...up },
    { y: 110, z: 0.5, radii: [13.2 * waist, 9.4 * waist], part: 'torso', ...up },
    { y: 122, z: 0.5, radii: [15 * chest, 10.6 * chest], part: 'torso', ...up },
    { y: 132, z: 0, radii: [16.4 * shoulders, 10.8 * chest], part: 'torso', ...up },
    { y: 140, z: -1, radii: [17 * shoulders, 9.4 * chest], part: 'torso', ...up },
    { y: 145.5, z: -1.5, radii: [11.5 * shoulders, 7.2], part: 'torso', ...up },
    { y: 149.5, z: -1, radii: [6.2, 6.2], part: 'neck', ...up },
    { y: 155, z: 0.5, radii: [5.5, 5.8], part: 'neck', ...up },
    { y: 158.5, z: 2, radii: [6.2, 7.4], part: 'head', ...up, shift: { 0: [0, -chin], 1: [0, -chin * 0.6] } },
    { y: 164, z: 2, radii: [7.2, 9.4], part: 'head', ...up, shift: { 0: [0, -2.6], 1: [0, 0.5] } },
    { y: 168, z: 1.4, radii: [7.6, 9.9], part: 'head', ...up, shift: { 0: [0, 0.4], 1: [0, 1.5] } },
    { y: 173, z: 1, radii: [7.7, 9.8], part: 'head', ...up },
    { y: 178, z: 0.5, radii: [6, 7.6], part: 'head', ...up },
    { y: 180, z: 0.5, radii: [3, 4], part: 'head', ...up },
  ];
}

function growBun(draft: CageDraft, start: HalfRing): void {
  const back = { part: 'head', towards: [0.2, -1] } as const;
  const trunk = growTrunk(draft, start, 'head', [
    { y: 170.4, z: -10.4, radii: [3, 3], ...back },
    { y: 170.9, z: -12, radii: [3.8, 3.8], ...back },
    { y: 171.4, z: -13.8, radii: [3.2, 3.2], ...back },
  ]);
  closeTrunk(draft, 'head', trunk.rows[trunk.rows.length - 1], [0, 0.1, -0.6]);
}

function leg(limbs: number): LimbStation[] {
  const r = (x: number, z: number): [number, number] => [x * limbs, z * limbs];
  return [
    { at: [9.6, 74, -0.5], radii: r(8.3, 9.3), part: 'thigh_L' },
    { at: [10.4, 62, 0.5], radii: r(7.6, 8.4), part: 'thigh_L' },
    { at: [11, 52, 0.8], radii: r(6, 6.6), part: 'thigh_L' },
    { at: [11.2, 47, 0.8], radii: r(5.4, 5.9), part: 'shin_L' },
    { at: [11.5, 37, -1], radii: r(5.3, 5.9), part: 'shin_L' },
    { at: [11.9, 22, -2], radii: r(3.8, 4.2), part: 'shin_L' },
    { at: [12, 11, -2.4], radii: r(3.3, 3.8), part: 'shin_L' },
    { at: [12.1, 6, -1.6], radii: r(3.7, 5), part: 'foot_L' },
    { at: [12.4, 4, 5], radii: r(4, 3.8), part: 'foot_L' },
    { at: [12.9, 2.7, 12], radii: r(4.6, 2.5), part: 'foot_L' },
    { at: [13.1, 2, 17.5], radii: r(3.8, 1.7), part: 'foot_L' },
  ];
}

function arm({ limbs, shoulders }: Build): LimbStation[] {
  const x = 17 * shoulders - 17;
  const r = (a: number, b: number): [number, number] => [a * limbs, b * limbs];
  return [
    { at: [21 + x, 138, -1.5], radii: r(5.2, 5), part: 'upperArm_L' },
    { at: [26 + x, 132.5, -1.8], radii: r(4.8, 4.4), part: 'upperArm_L' },
    { at: [35 + x, 121.5, -2.2], radii: r(4.1, 3.9), part: 'upperArm_L' },
    { at: [40 + x, 115, -2], radii: r(3.8, 3.7), part: 'forearm_L' },
    { at: [45 + x, 109, -1], radii: r(4, 3.6), part: 'forearm_L' },
    { at: [54 + x, 97, 2], radii: r(2.7, 2.3), part: 'forearm_L' },
    { at: [57 + x, 93, 3], radii: r(3, 2), part: 'hand_L' },
    { at: [60.5 + x, 87.5, 4], radii: r(4.2, 1.8), part: 'hand_L' },
    { at: [64 + x, 81, 5], radii: r(3.6, 1.5), part: 'hand_L' },
    { at: [66.5 + x, 76.5, 5.4], radii: r(2, 1), part: 'hand_L' },
  ];
}
