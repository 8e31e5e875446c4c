import type { Cage, FormatWarning } from '@/lib/engine/cage';
import { checkCoordinates } from '@/lib/formats/check-coordinates';
import { isAsItIs, unitInWords, type Placing, type ShowSpace, type StatedSpace } from './file-space';

/**
 * Brings a cage that was just read into the show's unit and axes, in place. Each coordinate is rounded once at most, and not at all where the axes alone turn.
 * Axes turn by a quarter about x, which keeps what is right-handed so. Creases, corners, labels and holes know no length and stay as they are.
 * Errors: MeshError number_too_large where a coordinate leaves its range.
 */
export function placeCage(cage: Cage, placing: Placing): void {
  if (isAsItIs(placing)) return;
  const { positions } = cage;
  if (placing.unitScale !== 1) {
    const inverse = Math.round(1 / placing.unitScale);
    // A hundredth is no double; dividing by a hundred is exact to the last digit.
    const divides = placing.unitScale < 1 && 1 / inverse === placing.unitScale;
    for (let i = 0; i < positions.length; i++) positions[i] = divides ? positions[i] / inverse : positions[i] * placing.unitScale;
    checkCoordinates(positions, 'converted to the show’s unit: ', null);
  }
  if (placing.turn === 'none') return;
  const sign = placing.turn === 'z-to-y' ? 1 : -1;
  for (let i = 0; i < positions.length; i += 3) {
    const [y, z] = [positions[i + 1], positions[i + 2]];
    // Adding zero keeps a zero from getting a sign.
    positions[i + 1] = sign * z + 0;
    positions[i + 2] = -sign * y + 0;
  }
}

/** What is said of a cage that was brought into the show's space: both units, both axes. */
export function placingNotes(stated: StatedSpace, space: Pick<ShowSpace, 'metresPerUnit' | 'upAxis'>, placing: Placing): FormatWarning[] {
  const notes: FormatWarning[] = [];
  const note = (code: string, message: string) => notes.push({ code, message, line: null, column: null });
  if (placing.unitScale !== 1 && stated.metresPerUnit !== null) {
    note('converted_unit', `The file is in ${unitInWords(stated.metresPerUnit)}, the show in ${unitInWords(space.metresPerUnit)}: its lengths were multiplied by ${placing.unitScale}.`);
  }
  if (placing.turn !== 'none' && stated.upAxis !== null) {
    note('turned_axis', `The file has ${stated.upAxis.toUpperCase()} up, the show ${space.upAxis.toUpperCase()} up: it was turned by a quarter about X.`);
  }
  return notes;
}
