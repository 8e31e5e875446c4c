import type { Finding, MeasuredPart, Three } from './measured';
import { placeOf } from './mesh/findings';

/** What a cage is usually as large as: another version of it, or what the show's assets measure. */
export interface SizeHabit {
  /** Largest dimension, file units. */
  usual: number;
  /** How many times larger or smaller is still usual; above 1. */
  spread: number;
  /** Doubt only ratios that lie between two units: for another version of the same thing, which may well have changed size. */
  onlyUnits: boolean;
}

/** Ratios of one unit to another: decimal steps, inches and feet against metric ones, inches to the foot. */
const UNIT_RATIOS: readonly number[] = [10, 100, 1000, 2.54, 25.4, 12, 30.48, 304.8, 39.3701, 3.28084];

/** Relative distance within which a ratio counts as one of UNIT_RATIOS. */
const NEAR_UNIT = 0.1;

/** The box of some parts together: its extents along x, y, z; null where none of them has one. */
export function extentOf(parts: readonly Pick<MeasuredPart, 'bounds'>[]): Three | null {
  const measured = parts.filter(({ bounds }) => bounds.every(Number.isFinite));
  if (measured.length === 0) return null;
  return [0, 1, 2].map((axis) => Math.max(...measured.map(({ bounds }) => bounds[3 + axis])) - Math.min(...measured.map(({ bounds }) => bounds[axis]))) as Three;
}

/**
 * Doubts the unit of a cage whose size is far from the habit: a warning at the part that is largest, with the cage's size and what to do. Null where nothing is to be
 * doubted. No part of a geometry record: the same file may be usual in one show and a slip in another.
 */
export function diagnoseSize(parts: readonly Pick<MeasuredPart, 'name' | 'bounds'>[], { usual, spread, onlyUnits }: SizeHabit): Finding | null {
  const extent = extentOf(parts);
  if (extent === null || !(usual > 0)) return null;
  const largest = Math.max(...extent);
  const ratio = Math.max(largest / usual, usual / largest);
  const unit = UNIT_RATIOS.find((step) => Math.abs(ratio / step - 1) < NEAR_UNIT);
  if (!(ratio > spread) || !(largest > 0) || (onlyUnits && unit === undefined)) return null;
  const size = (part: Pick<MeasuredPart, 'bounds'>): number => Math.max(...(extentOf([part]) ?? [0]));
  const part = parts.reduce((best, other) => (size(other) > size(best) ? other : best));
  const position = [0, 1, 2].map((axis) => (part.bounds[axis] + part.bounds[3 + axis]) / 2) as Three;
  const told = extent.map((value) => Number(value.toPrecision(4))).join(' × ');
  const step = unit === undefined ? '' : `, as when a unit is taken for one ${unit} times ${largest > usual ? 'smaller' : 'larger'}`;
  return {
    code: 'size_unusual', severity: 'warning', part: part.name, count: 1, places: [placeOf({ position })],
    message: `Measures ${told} file units, ${Number(ratio.toPrecision(3))} times ${largest > usual ? 'more' : 'less'} than usual${step}; check the unit that the file was written in.`,
  };
}
