import { MeshError } from '@/lib/formats/mesh-error';
import type { OtherSpace, Turn, UpAxis } from '@/lib/rules/units';

/** What a show's lengths and axes mean, and what it does with files that state others. */
export interface ShowSpace {
  metresPerUnit: number;
  upAxis: UpAxis;
  other: OtherSpace;
}

/** What a file states of its unit and up axis; null where it is silent, which counts as agreement. */
export interface StatedSpace {
  metresPerUnit: number | null;
  upAxis: UpAxis | null;
}

/** What is done to a cage on reading, so that its lengths and axes are the show's: lengths times `unitScale`, axes turned. */
export interface Placing {
  unitScale: number;
  turn: Turn;
}

export const AS_IT_IS: Placing = { unitScale: 1, turn: 'none' };

/** Units are written as decimals, some of them rounded. */
const SAME_UNIT = 1e-6;

/** Units by name with their length in tenths of a micrometre, all whole, so that the ratio of two is as exact as a double can be. Inch, foot, yard and mile by the agreement of 1959. */
const KNOWN_UNITS: readonly [name: string, tenthMicrometres: number][] = [
  ['micrometres', 10], ['millimetres', 10_000], ['centimetres', 100_000], ['decimetres', 1_000_000], ['metres', 10_000_000], ['kilometres', 10_000_000_000],
  ['inches', 254_000], ['feet', 3_048_000], ['yards', 9_144_000], ['miles', 16_093_440_000],
];
const TENTH_MICROMETRES_PER_METRE = 1e7;

function knownUnit(metresPerUnit: number): { name: string; length: number } | null {
  for (const [name, length] of KNOWN_UNITS) if (Math.abs((metresPerUnit * TENTH_MICROMETRES_PER_METRE) / length - 1) <= SAME_UNIT) return { name, length };
  return null;
}

/** A unit in words: "centimetres", or "units of 0.37 m" where it has no name. */
export function unitInWords(metresPerUnit: number): string {
  return knownUnit(metresPerUnit)?.name ?? `units of ${metresPerUnit} m`;
}

/** What has to be done to a file that states this, so that it stands in the show's space. Pure: equal for equal bytes and shows of equal space. */
export function placingIn(stated: StatedSpace, space: Pick<ShowSpace, 'metresPerUnit' | 'upAxis'>): Placing {
  return { unitScale: unitScale(stated.metresPerUnit, space.metresPerUnit), turn: stated.upAxis === null || stated.upAxis === space.upAxis ? 'none' : stated.upAxis === 'y' ? 'y-to-z' : 'z-to-y' };
}

function unitScale(from: number | null, to: number): number {
  if (from === null || Math.abs(from / to - 1) <= SAME_UNIT) return 1;
  const [one, other] = [knownUnit(from), knownUnit(to)];
  return one && other ? one.length / other.length : from / to;
}

/** Whether nothing has to be done. */
export function isAsItIs({ unitScale, turn }: Placing): boolean {
  return unitScale === 1 && turn === 'none';
}

/**
 * What is done to a file that states this in a show of that space, or its refusal where the show converts nothing.
 * Errors: MeshError units_disagree and axis_disagrees, with both units or axes named.
 */
export function placeOrRefuse(stated: StatedSpace, space: ShowSpace): Placing {
  const placing = placingIn(stated, space);
  if (space.other === 'convert') return placing;
  if (placing.unitScale !== 1) {
    const [expected, found] = [unitInWords(space.metresPerUnit), unitInWords(stated.metresPerUnit!)];
    throw new MeshError({ code: 'units_disagree', expected, found, detail: `expected ${expected} as in the show, found a file in ${found}: export it in the show's unit, or let the show convert` });
  }
  if (placing.turn !== 'none') {
    const [expected, found] = [`${space.upAxis.toUpperCase()} up`, `${stated.upAxis!.toUpperCase()} up`];
    throw new MeshError({ code: 'axis_disagrees', expected, found, detail: `expected ${expected} as in the show, found a file with ${found}: export it the show's way up, or let the show convert` });
  }
  return placing;
}
