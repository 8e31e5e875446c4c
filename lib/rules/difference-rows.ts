import type { ComparedNumbers, ComparisonAnswer } from './comparison';
import { METRES_PER, type LinearUnit } from './units';

/** One line of the table of differences, in the unit that its group or label names. */
export interface DifferenceLine {
  key: string;
  label: string;
  unit: string | null;
  before: number | null;
  after: number | null;
  difference: number | null;
  /** Of what the group says; null where there is nothing to take it of. */
  percent: number | null;
  /** The show's tolerance for this line, in percent. */
  limitPercent: number | null;
  /** Lengths and angles count from an origin; what spans magnitudes has its exponent apart. */
  notation: 'fixed' | 'engineering';
  /** What is below it is rounding, and shown as zero. */
  noise: number;
}

export interface DifferenceGroup {
  title: string;
  /** What the percentages of the group are of. */
  percentOf: string;
  lines: DifferenceLine[];
}

interface LineOptions {
  /** Divides the numbers into the line's unit. */
  per?: number;
  percentOf?: number | null;
  limitPercent?: number;
  notation?: DifferenceLine['notation'];
  noise?: number;
}

/** Share of the largest moment below which a matrix entry is what rounding left. */
const ROUNDING = 1e-12;

const INERTIA = ['ixx', 'iyy', 'izz', 'ixy', 'ixz', 'iyz'] as const;
const SUBSCRIPTS = { ixx: 'Ixx', iyy: 'Iyy', izz: 'Izz', ixy: 'Ixy', ixz: 'Ixz', iyz: 'Iyz' } as const;

/** Before, after and the difference of everything that is compared, lengths in the show's unit; what neither side has is left out. */
export function differenceGroups(of: ComparisonAnswer, unit: LinearUnit): DifferenceGroup[] {
  const said = ({ before, after, difference, percent }: DifferenceLine): boolean => [before, after, difference, percent].some((value) => value !== null);
  const groups = allGroups(of, unit).map((group) => ({ ...group, lines: group.lines.filter((line) => said(line) || (of.differences !== null && line.key === 'rotation')) }));
  return groups.filter((group) => group.lines.length > 0);
}

function allGroups(of: ComparisonAnswer, unit: LinearUnit): DifferenceGroup[] {
  const [a, b] = [of.before.numbers, of.after.numbers];
  const length = METRES_PER[unit];
  const line = (key: string, label: string, lineUnit: string | null, [first, second]: readonly (number | null)[], more: LineOptions = {}): DifferenceLine => {
    const per = more.per ?? 1;
    const [before, after] = [first, second].map((value) => (value === null ? null : value / per));
    const difference = before === null || after === null ? null : after - before;
    const whole = more.percentOf === undefined ? before : more.percentOf === null ? null : more.percentOf / per;
    return { key, label, unit: lineUnit, before, after, difference, percent: difference === null || !whole ? null : (difference / Math.abs(whole)) * 100, limitPercent: more.limitPercent ?? null, notation: more.notation ?? 'engineering', noise: more.noise ?? 0 };
  };
  const alone = (key: string, label: string, lineUnit: string | null, difference: number | null, percent: number | null, limitPercent: number | null): DifferenceLine => ({ key, label, unit: lineUnit, before: null, after: null, difference, percent, limitPercent, notation: 'fixed', noise: 0 });
  const both = (pick: (numbers: ComparedNumbers) => number): (number | null)[] => [a && pick(a), b && pick(b)];
  const { differences: d, tolerances } = of;
  const shiftM = d && Math.hypot(...d.com_shift_m);
  const largest = a?.i3_kg_m2 ?? null;
  return [
    {
      title: 'Mass and surface',
      percentOf: 'of the value before',
      lines: [
        line('mass', 'Mass', 'kg', both((n) => n.mass_kg), { limitPercent: tolerances.mass_percent }),
        line('volume', 'Volume', `${unit}³`, [of.before.volume_m3, of.after.volume_m3], { per: length ** 3 }),
        line('area', 'Area', `${unit}²`, [of.before.area_m2, of.after.area_m2], { per: length ** 2 }),
      ],
    },
    {
      title: `Centre of mass in the axes of ${of.asset}`,
      percentOf: 'of its size',
      lines: [
        ...(['x', 'y', 'z'] as const).map((axis) => line(`com_${axis}`, axis, unit, both((n) => n[`com_${axis}_m`]), { per: length, percentOf: of.size_m, notation: 'fixed' })),
        alone('shift', 'Shift', unit, shiftM === null ? null : shiftM / length, d && d.com_shift_of_size * 100, tolerances.com_percent),
      ],
    },
    {
      title: 'Principal moments and axes',
      percentOf: 'of the moment before',
      lines: [
        ...([1, 2, 3] as const).map((index) => line(`i${index}`, `I${index}`, 'kg m²', both((n) => n[`i${index}_kg_m2`]))),
        alone('rotation', `Rotation of the axes${d?.rotation_deg === null ? silentWords(a, b) : ''}`, '°', d?.rotation_deg ?? null, null, null),
      ],
    },
    {
      title: 'Inertia matrix about the centre of mass',
      percentOf: 'of the largest moment before',
      lines: [
        ...INERTIA.map((entry) => line(entry, SUBSCRIPTS[entry], 'kg m²', both((n) => n[`${entry}_kg_m2`]), { percentOf: largest, noise: ROUNDING * (largest ?? 0) })),
        alone('inertia', 'Matrix as a whole', null, null, d && d.inertia_change * 100, tolerances.moments_percent),
      ],
    },
  ];
}

/** Why nothing is said of the axes: they are free, or their moments lie too close for what they changed by. */
function silentWords(before: ComparedNumbers | null, after: ComparedNumbers | null): string {
  return [before, after].some((one) => one !== null && one.free_axes !== '') ? ', free' : ', moments too close to tell';
}

/** Whether a line's change is beyond the show's tolerance; null where none is set for it or nothing is compared. */
export function isBeyond(line: Pick<DifferenceLine, 'percent' | 'limitPercent'>): boolean | null {
  return line.limitPercent === null || line.percent === null ? null : Math.abs(line.percent) > line.limitPercent;
}
