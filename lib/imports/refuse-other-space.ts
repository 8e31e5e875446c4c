import type { Cage } from '@/lib/engine/cage';
import { MeshError } from '@/lib/formats/mesh-error';

/** What a show's lengths and axes mean. */
export interface ShowSpace {
  metresPerUnit: number;
  upAxis: 'y' | 'z';
}

/** Units are written as decimals, some of them rounded. */
const SAME_UNIT = 1e-6;

/**
 * Refuses a cage whose file states another unit or up axis than the show's: a record is in the file's own unit and read in the show's, so a disagreement would put
 * every mass wrong in silence. Files that state nothing are taken to be in the show's. Errors: MeshError units_disagree, axis_disagrees.
 */
export function refuseOtherSpace({ metresPerUnit, upAxis }: Pick<Cage, 'metresPerUnit' | 'upAxis'>, space: ShowSpace): void {
  if (metresPerUnit !== null && Math.abs(metresPerUnit / space.metresPerUnit - 1) > SAME_UNIT) {
    throw new MeshError({
      code: 'units_disagree',
      expected: `${space.metresPerUnit} metres per unit`,
      found: String(metresPerUnit),
      detail: `expected the show's ${space.metresPerUnit} metres per unit, found a file in ${metresPerUnit}: export it in the show's unit`,
    });
  }
  if (upAxis !== null && upAxis !== space.upAxis) {
    const [expected, found] = [space.upAxis.toUpperCase(), upAxis.toUpperCase()];
    throw new MeshError({ code: 'axis_disagrees', expected, found, detail: `expected ${expected} up as in the show, found a file with ${found} up: export it the show's way up` });
  }
}
