import { CageDraft } from './cage-draft';
import { closeTrunk, layTrunk, nearEnd, type TrunkStation } from './half-tube';
import { layPlate } from './plates';
import { growLimb } from './rings';
import type { Vec } from './vector';

const SEGMENTS = 7;

/** The king of the eels, three metres and a half: a crowned head, seven segments in a swimming bend, fins. */
export function eel(): CageDraft {
  const draft = new CageDraft();
  const body: TrunkStation[] = [];
  for (let segment = SEGMENTS; segment >= 1; segment--) {
    for (const half of [1, 0.5]) {
      const along = segment - 1 + half;
      const thick = 15 - 0.16 * along * along - 0.35 * along;
      body.push({ z: 96 - along * 36, y: 20, radii: [thick * 0.82, thick], part: `segment_${segment}` });
    }
  }
  const trunk = layTrunk(
    draft,
    [
      { z: -206, y: 22, radii: [0.5, 3], part: 'tailFin' },
      { z: -200, y: 21, radii: [0.9, 9], part: 'tailFin' },
      { z: -184, y: 20, radii: [1.6, 11], part: 'tailFin' },
      { z: -168, y: 20, radii: [3, 7], part: 'tailFin' },
      ...body,
      { z: 96, y: 20, radii: [12.3, 15], part: 'head' },
      { z: 108, y: 21, radii: [13, 14.5], part: 'head' },
      { z: 122, y: 21.5, radii: [12, 12.5], part: 'head' },
      { z: 136, y: 20, radii: [9.5, 9], part: 'head' },
      { z: 148, y: 18, radii: [7, 6], part: 'head', square: 1.15 },
      { z: 155, y: 17, radii: [4.6, 3.8], part: 'head', square: 1.15 },
    ],
    6,
    [{ rows: [16, 18], columns: [2, 3] }],
  );
  closeTrunk(draft, 'tailFin', nearEnd(trunk), [0, 0, -0.6]);
  closeTrunk(draft, 'head', trunk.rows[trunk.rows.length - 1], [0, 0, 1]);
  growLimb(
    draft,
    trunk.openings[0],
    [
      { at: [15, 15, 80], radii: [6, 1.6], part: 'fin_L' },
      { at: [22, 13, 75], radii: [8, 1.1], part: 'fin_L' },
      { at: [31, 11, 67], radii: [9, 0.8], part: 'fin_L' },
      { at: [38, 9.5, 58], radii: [5, 0.5], part: 'fin_L' },
    ],
    { hint: [0, 0, 1] },
  );
  draft.mirror();
  draft.reshape(swimmingBend);
  layCrown(draft);
  return draft;
}

/** Swings the body sideways behind the fins; the head and the fins stay as they are. */
function swimmingBend([x, y, z]: Vec): Vec {
  const behind = Math.max(0, 56 - z);
  return [x + 26 * Math.sin(behind / 46) * Math.min(1, behind / 90), y, z];
}

/** A crown of nine points that sits on the head. */
function layCrown(draft: CageDraft): void {
  const points = 9;
  const rows = [0, 0.5, 1].map((height) =>
    Array.from({ length: 2 * points }, (_, i): Vec => {
      const angle = (-2 * Math.PI * i) / (2 * points);
      const peak = height === 1 ? (i % 2 === 0 ? 9 : 3.5) : height * 4;
      const radius = 8.4 + peak * 0.22;
      return [radius * Math.cos(angle), 36.6 + peak, 112 + radius * Math.sin(angle)];
    }),
  );
  layPlate(draft, 'crown', rows, 0.8, { around: true, sharpRim: true });
}
