import { CageDraft } from './cage-draft';
import { pointOnTrunk } from './half-tube';
import { oxTrunk } from './ox';
import { layHoop, layPlate } from './plates';
import { layRope } from './solids';
import type { Vec } from './vector';

const LEATHER = 0.7;

/** The draught harness of the ox, in the ox's own space. */
export function harness(): CageDraft {
  const draft = new CageDraft();
  const trunk = oxTrunk(0);
  const around = (row: number, lift: number): Vec[] => Array.from({ length: 16 }, (_, i) => pointOnTrunk(trunk, row, (i * 360) / 16, lift));
  layRope(draft, 'collar', around(7.75, 5.5), { radius: 4, sides: 8, hint: [0, 0.45, 1], closed: true });
  layRope(
    draft,
    'yoke',
    [[-62, 152, 60], [-58, 153, 60], [-38, 158, 60], [-16, 158, 60], [0, 157, 60], [16, 158, 60], [38, 158, 60], [58, 153, 60], [62, 152, 60]],
    { radius: [4, 4.6, 5, 4.8, 4.6, 4.8, 5, 4.6, 4], sides: 8, hint: [0, 1, 0] },
  );
  layHoop(draft, 'girth', { centre: [0, 102.4, 0], axis: [0, 0, 1], hint: [1, 0, 0], radii: [36, 38.6], width: 9, thickness: LEATHER });
  layPlate(draft, 'backStrap', strap(8, (i) => 7.2 - i * 0.82, [99, 93, 87, 81], 3.6), LEATHER, { sharpRim: true });
  layBreeching(draft);
  const trace: Vec[] = [[27.5, 112, 66], [35, 106, 45], [40, 100, 12], [42.5, 95, -20], [43, 90, -60], [42.5, 84, -100], [42, 80, -122]];
  layRope(draft, 'trace_L', trace, { radius: 1.6, sides: 8, hint: [0, 1, 0], flat: 0.5 });
  layRope(draft, 'trace_R', trace.map(([x, y, z]): Vec => [-x, y, z]), { radius: 1.6, sides: 8, hint: [0, 1, 0], flat: 0.5 });
  layHoop(draft, 'bridle', { centre: [0, 119.5, 139], axis: [0, -1, 1], hint: [1, 0, 0], radii: [11, 13.4], width: 4, thickness: 0.5 });
  return draft;

  function strap(rows: number, row: (i: number) => number, angles: readonly number[], lift: number): Vec[][] {
    return Array.from({ length: rows }, (_, i) => [...angles].map((angle) => pointOnTrunk(trunk, row(i), angle, lift)));
  }
}

/** The strap around the haunches that lets an animal hold a load back. */
function layBreeching(draft: CageDraft): void {
  const path: [number, number][] = [[39, -34], [40, -58], [37, -80], [26, -99], [10, -107], [-10, -107], [-26, -99], [-37, -80], [-40, -58], [-39, -34]];
  const grid = [86, 90.5, 95].map((y) => path.map(([x, z]): Vec => [x, y, z]));
  layPlate(draft, 'breeching', grid, LEATHER, { sharpRim: true });
}
