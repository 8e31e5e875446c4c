import { equalEllipsoid } from '@/lib/rules/equal-ellipsoid';
import { formatFixed, formatProse } from '@/lib/rules/format-figure';
import { METRES_PER, type LinearUnit } from '@/lib/rules/units';
import type { DrawnWeight } from './part-scene';

/** What the drawing shows, in words and numbers. */
export function describeWeight(part: string, weight: DrawnWeight | null, unit: LinearUnit): string {
  if (weight === null) return `Limit surface of ${part}. It has no mass yet, so no centre of mass is drawn.`;
  const lengths = (metres: readonly number[]) =>
    metres.map((value) => formatFixed(value / METRES_PER[unit], 3)).join(', ');
  const moments = weight.momentsKgM2.map((value) => Number(value.toPrecision(4)));
  const sentences = [
    `Limit surface of ${part}, mass ${formatProse(weight.massKg)} kg.`,
    `Centre of mass at x, y, z ${lengths(weight.centreM)} ${unit}.`,
    `Principal moments ${moments.join(', ')} kg m².`,
    `Quaternion w, x, y, z of the principal axes ${weight.quatWxyz.map((value) => formatFixed(value)).join(', ')}.`,
    `The solid ellipsoid of equal mass and inertia has semi-axes ${lengths(equalEllipsoid(weight.massKg, weight.momentsKgM2))} ${unit}.`,
  ];
  if (weight.freeAxes !== '') sentences.push(`Axes ${[...weight.freeAxes].join(', ')} are free.`);
  return sentences.join(' ');
}
