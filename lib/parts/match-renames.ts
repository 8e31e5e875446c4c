import type { RenameFit } from '@/lib/rules/part-rename';
import { distanceOf, isSamePlace, isSameShape, type PartShape } from './part-shape';

/** A part to be matched; versions of the asset count from 1 in their order. */
export interface ShapedPart {
  id: string;
  name: string;
  /** Of an absent part the last version that has it, of an arrived one the first. */
  version: number;
  shape: PartShape | null;
}

export interface RenameMatch {
  from: string;
  to: string;
  fit: Exclude<RenameFit, 'hand'>;
  /** Other arrived parts with the same geometry that the absent one could be as well. */
  others: number;
}

/** Beyond this many equal parts on a side only those in one place are matched. */
const MOST_ALIKE = 200;

/**
 * Which absent part an arrived one may be under another name: each at most once, those in one place first, then the nearest. Two parts that
 * were in one version are never one.
 * @param refused pairs that a person kept apart, as `from to` of ids
 */
export function matchRenames(absent: readonly ShapedPart[], arrived: readonly ShapedPart[], refused: ReadonlySet<string>): RenameMatch[] {
  const matches: RenameMatch[] = [];
  const kindOf = ({ shape }: ShapedPart): string => `${shape?.faces} ${shape?.components}`;
  const kinds = groupBy(arrived.filter((part) => part.shape !== null).toSorted(byName), kindOf);
  for (const [kind, lost] of groupBy(absent.filter((part) => part.shape !== null).toSorted(byName), kindOf)) {
    const taken = new Set<string>();
    const may = (from: ShapedPart, to: ShapedPart): boolean => to.version > from.version && !taken.has(to.id) && !refused.has(`${from.id} ${to.id}`);
    const fits = (from: ShapedPart, to: ShapedPart): boolean => may(from, to) && isSameShape(from.shape!, to.shape!);
    const found = kinds.get(kind) ?? [];
    const take = (from: ShapedPart, to: ShapedPart, fit: RenameMatch['fit'], others: number): void => {
      taken.add(to.id);
      matches.push({ from: from.id, to: to.id, fit, others });
    };
    const left = lost.filter((from) => {
      const to = found.find((one) => isSamePlace(from.shape!, one.shape!) && fits(from, one));
      if (to) take(from, to, 'place', 0);
      return !to;
    });
    if (left.length > MOST_ALIKE || found.length > MOST_ALIKE) continue;
    const pairs = left.flatMap((from) => found.filter((to) => fits(from, to)).map((to) => ({ from, to, distance: distanceOf(from.shape!, to.shape!) })));
    const alike = groupBy(pairs, (pair) => pair.from.id);
    const done = new Set<string>();
    for (const { from, to } of pairs.toSorted((a, b) => a.distance - b.distance || byName(a.from, b.from) || byName(a.to, b.to))) {
      if (done.has(from.id) || taken.has(to.id)) continue;
      done.add(from.id);
      take(from, to, 'shape', alike.get(from.id)!.length - 1);
    }
  }
  return matches;
}

function groupBy<T>(items: readonly T[], key: (item: T) => string): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const group = groups.get(key(item));
    if (group) group.push(item);
    else groups.set(key(item), [item]);
  }
  return groups;
}

function byName(a: ShapedPart, b: ShapedPart): number {
  return a.name < b.name ? -1 : a.name > b.name ? 1 : 0;
}
