import { CageDraft } from './cage-draft';
import { pointOnTrunk } from './half-tube';
import { oxTrunk } from './ox';
import { layPlate } from './plates';
import { turnSolid } from './solids';
import type { Vec } from './vector';

const PLATE = 0.6;
const LIFT = 3.2;

/** Rows of the ox's trunk and angles around it that a plate covers. */
interface Cover {
  part: string;
  rows: readonly [number, number];
  angles: readonly [number, number];
  lift?: number;
}

const MIDDLE: readonly Cover[] = [
  { part: 'chanfron', rows: [11.3, 14.6], angles: [38, 142], lift: 1.6 },
  { part: 'crinet', rows: [8.3, 9.9], angles: [15, 165] },
  { part: 'peytral', rows: [6.9, 8.1], angles: [-165, -15], lift: 4 },
  { part: 'crupper', rows: [0.7, 2.9], angles: [8, 172] },
];

const LEFT: readonly Cover[] = [
  { part: 'flanchard_L', rows: [3.1, 5], angles: [-35, 48] },
  { part: 'shoulderPlate_L', rows: [5.2, 7], angles: [4, 66] },
];

/** Plates of an armoured ox, in the ox's own space: thin closed shells, and hollow caps for the horns. */
export function barding(): CageDraft {
  const draft = new CageDraft();
  for (const cover of MIDDLE) layCover(draft, cover, 1);
  for (const cover of LEFT) {
    layCover(draft, cover, 1);
    layCover(draft, { ...cover, part: cover.part.replace('_L', '_R') }, -1);
  }
  for (const side of [1, -1]) {
    turnSolid(
      draft,
      side > 0 ? 'hornCap_L' : 'hornCap_R',
      [{ radius: 3.6, along: 0, sharp: true }, { radius: 3.4, along: 4 }, { radius: 2.6, along: 13 }, { radius: 1.4, along: 21 }, { radius: 0.4, along: 26 }],
      { origin: [side * 51.4, 176, 113.6], axis: [side * -0.02, 1, 0.05], sides: 8 },
    );
  }
  return draft;
}

function layCover(draft: CageDraft, { part, rows, angles, lift = LIFT }: Cover, side: 1 | -1): void {
  const trunk = oxTrunk(0);
  const grid = Array.from({ length: 6 }, (_, r) =>
    Array.from({ length: 8 }, (_, c): Vec => {
      // On the right side the angles run the other way round, so that the outside stays outside.
      const share = side > 0 ? c / 7 : 1 - c / 7;
      const [x, y, z] = pointOnTrunk(trunk, rows[0] + ((rows[1] - rows[0]) * r) / 5, angles[0] + (angles[1] - angles[0]) * share, lift);
      return [side * x, y, z];
    }),
  );
  layPlate(draft, part, grid, PLATE, { sharpRim: true });
}
