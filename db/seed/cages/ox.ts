import { CageDraft } from './cage-draft';
import { closeTrunk, growTrunk, layTrunk, nearEnd, type TrunkStation } from './half-tube';
import { growLimb, type LimbStation } from './rings';
import { times } from './vector';

const SIDES = 6;
/** Height up to which legs are stretched, cm. */
const BELLY = 66;

export interface OxBuild {
  /** Height of a hump over the shoulders, cm; 0 for none. */
  hump: number;
  /** Length of the horns beside a grown ox's. */
  horns: number;
  /** Length of the legs beside a grown ox's. */
  legs: number;
  /** Size of the whole animal beside a grown ox's. */
  size: number;
}

/** A draught ox, 150 cm at the shoulder, on one skin: trunk, neck and head, four legs, horns, ears and tail. */
export function ox(build: OxBuild): CageDraft {
  const draft = new CageDraft();
  const trunk = layTrunk(draft, oxTrunk(build.hump), SIDES, [
    { rows: [1, 3], columns: [1, 3] },
    { rows: [5, 7], columns: [1, 3] },
    { rows: [10, 11], columns: [4, 5] },
    { rows: [10, 11], columns: [3, 4] },
    { rows: [0, 1], columns: [5, 6] },
  ]);
  const [hind, fore, horn, ear, tail] = trunk.openings;
  closeTrunk(draft, 'torso', nearEnd(trunk), [0, 0, -2]);
  closeTrunk(draft, 'muzzle', trunk.rows[trunk.rows.length - 1], [0, -1, 1.5]);
  growLimb(draft, fore, foreleg(), { hint: [0, 0, 1] });
  growLimb(draft, hind, hindleg(), { hint: [0, 0, 1] });
  growLimb(draft, horn, hornStations(build.horns), { hint: [0, 0, 1], bulge: 0.3 });
  growLimb(draft, ear, EAR, { hint: [0, 1, 0] });
  growTail(draft, tail);
  draft.mirror();
  const raise = BELLY * (build.legs - 1);
  draft.reshape(([x, y, z]) => times([x, y < BELLY ? y * build.legs : y + raise, z], build.size));
  return draft;
}

/** Cross-sections from rump to muzzle; harness and barding lie on the same ones. */
export function oxTrunk(height: number): TrunkStation[] {
  const hump = (share: number) => {
    const rise = height * share;
    return { 6: [0, rise], 5: [rise * 0.12, rise * 0.8], 4: [rise * 0.2, rise * 0.25] } as const;
  };
  return [
    { z: -97, y: 113, radii: [12.5, 17], part: 'torso', towards: [0.05, 1] },
    { z: -88, y: 113, radii: [23, 27], part: 'torso', towards: [0.05, 1] },
    { z: -68, y: 112, radii: [29.5, 31.5], part: 'torso', square: 1.1 },
    { z: -46, y: 109, radii: [29, 30], part: 'torso' },
    { z: -18, y: 103.5, radii: [33, 34.5], part: 'torso', shift: hump(0.12) },
    { z: 10, y: 102.5, radii: [34, 37], part: 'torso', shift: hump(0.55) },
    { z: 33, y: 106, radii: [29.5, 39.5], part: 'torso', shift: hump(1) },
    { z: 56, y: 111, radii: [26, 35.5], part: 'torso', shift: { ...hump(0.6), 0: [0, -4] } },
    { z: 74, y: 118, radii: [18.5, 28], part: 'neck', towards: [0.45, 1], shift: { 0: [0, -10], 1: [-4, -3] } },
    { z: 91, y: 129, radii: [13.5, 22], part: 'neck', towards: [0.5, 1], shift: { 0: [0, -9], 1: [-3.5, -2] } },
    { z: 106, y: 138, radii: [12.5, 17], part: 'head', towards: [0.25, 1] },
    { z: 117, y: 140, radii: [13.5, 15], part: 'head', towards: [-0.45, 1] },
    { z: 127, y: 134, radii: [12.5, 14], part: 'head', towards: [-0.8, 1], square: 1.15 },
    { z: 137, y: 122, radii: [10, 12.5], part: 'head', towards: [-1, 1] },
    { z: 145, y: 112, radii: [8.5, 10], part: 'muzzle', towards: [-1, 1] },
    { z: 152, y: 104, radii: [10.4, 9.6], part: 'muzzle', towards: [-1, 1], square: 1.15 },
    { z: 157, y: 98, radii: [7.5, 7.5], part: 'muzzle', towards: [-1, 1], square: 1.15 },
  ];
}

function foreleg(): LimbStation[] {
  const x = 19;
  return [
    { at: [x + 4, 78, 32], radii: [16.5, 9.5], part: 'foreleg_L' },
    { at: [x + 2, 62, 28], radii: [11, 8.6], part: 'foreleg_L' },
    { at: [x, 48, 29], radii: [6.6, 6.2], part: 'foreleg_L' },
    { at: [x, 42, 30.5], radii: [6.4, 6], part: 'foreleg_L' },
    { at: [x, 36, 30], radii: [5.4, 5.2], part: 'foreshin_L' },
    { at: [x, 22, 29.5], radii: [4.2, 4.2], part: 'foreshin_L' },
    { at: [x, 13, 30.5], radii: [5.2, 5], part: 'foreshin_L' },
    { at: [x, 9, 32], radii: [5.2, 5], part: 'foreshin_L' },
    { at: [x, 7, 33], radii: [6.6, 6], part: 'forehoof_L' },
    { at: [x, 0, 35], radii: [8.2, 7], part: 'forehoof_L', towards: [0, -1, 0], sharp: true },
  ];
}

function hindleg(): LimbStation[] {
  const x = 18;
  return [
    { at: [x + 6, 84, -66], radii: [22, 10], part: 'thigh_L' },
    { at: [x + 5, 68, -62], radii: [16, 9.5], part: 'thigh_L' },
    { at: [x + 2, 55, -66], radii: [9.5, 7], part: 'thigh_L' },
    { at: [x, 46, -74], radii: [7, 5.4], part: 'shin_L' },
    { at: [x, 40, -77], radii: [6.2, 5], part: 'shin_L' },
    { at: [x, 26, -75], radii: [4.6, 4.4], part: 'shin_L' },
    { at: [x, 14, -72.5], radii: [5.2, 5], part: 'shin_L' },
    { at: [x, 9, -70], radii: [5.2, 5], part: 'shin_L' },
    { at: [x, 7, -68.5], radii: [6.6, 6], part: 'hoof_L' },
    { at: [x, 0, -66.5], radii: [8.2, 7], part: 'hoof_L', towards: [0, -1, 0], sharp: true },
  ];
}

function hornStations(length: number): LimbStation[] {
  const out = (x: number, y: number, z: number): [number, number, number] => [10 + (x - 10) * length, 150 + (y - 150) * length, 106 + (z - 106) * length];
  return [
    { at: out(14, 153, 106), radii: [4.6, 4.4], part: 'horn_L' },
    { at: out(24, 156, 106), radii: [4, 4], part: 'horn_L' },
    { at: out(37, 160, 109), radii: [3.2, 3.2], part: 'horn_L' },
    { at: out(47, 170, 113), radii: [2.3, 2.3], part: 'horn_L' },
    { at: out(51, 183, 115), radii: [1.4, 1.4], part: 'horn_L' },
    { at: out(50, 193, 115), radii: [0.5, 0.5], part: 'horn_L' },
  ];
}

const EAR: LimbStation[] = [
  { at: [14, 143, 104], radii: [2.2, 2.4], part: 'ear_L' },
  { at: [20, 143, 101], radii: [4.4, 1.6], part: 'ear_L' },
  { at: [28, 141, 98], radii: [5, 1.4], part: 'ear_L' },
  { at: [34, 138, 96.5], radii: [2.4, 1], part: 'ear_L' },
];

function growTail(draft: CageDraft, start: number[]): void {
  const trunk = growTrunk(draft, start, 'tail', [
    { z: -101, y: 127, radii: [4, 4], part: 'tail', towards: [-0.4, -1] },
    { z: -106, y: 118, radii: [3.2, 3.2], part: 'tail', towards: [-1, -0.25] },
    { z: -106.5, y: 96, radii: [2.6, 2.6], part: 'tail', towards: [-1, 0] },
    { z: -106.5, y: 74, radii: [2.2, 2.2], part: 'tailTuft', towards: [-1, 0] },
    { z: -106.5, y: 66, radii: [4.2, 4.2], part: 'tailTuft', towards: [-1, 0] },
    { z: -106.5, y: 52, radii: [4.6, 4.6], part: 'tailTuft', towards: [-1, 0] },
    { z: -106.5, y: 42, radii: [1.6, 1.6], part: 'tailTuft', towards: [-1, 0] },
  ]);
  closeTrunk(draft, 'tailTuft', trunk.rows[trunk.rows.length - 1], [0, -0.5, 0]);
}
