import type { ValueState } from './states';

/** A part of a shot that has nothing to be locked to. */
export interface MissingValue {
  shot: string;
  asset: string;
  part: string;
  copy: string;
  state: ValueState;
  /** It has an override in the shot that nobody approved yet. */
  override: boolean;
}

/** What locking whole shots came to. */
export interface LockShotsAnswer {
  locked: number;
  missing: MissingValue[];
}

/** Why a part could not be locked, in words. */
export function whyMissing({ state, override }: Pick<MissingValue, 'state' | 'override'>): string {
  if (override) return 'override not approved yet';
  switch (state) {
    case 'unset':
      return 'no mass yet';
    case 'blocked':
      return 'blocked';
    case 'outdated':
      return 'changed since its approval';
    case 'left_out':
      return 'left out';
    default:
      return 'not approved yet';
  }
}

/** Missing parts of one asset that lack the same. */
export interface MissingGroup {
  why: string;
  asset: string;
  parts: string[];
  shots: string[];
}

/** Missing parts by what they lack and by asset, the most frequent first. */
export function groupMissing(missing: readonly MissingValue[]): MissingGroup[] {
  const groups = new Map<string, { why: string; asset: string; parts: Set<string>; shots: Set<string> }>();
  for (const one of missing) {
    const why = whyMissing(one);
    const key = `${why} ${one.asset}`;
    const group = groups.get(key) ?? { why, asset: one.asset, parts: new Set(), shots: new Set() };
    group.parts.add(one.part);
    group.shots.add(one.shot);
    groups.set(key, group);
  }
  return [...groups.values()].map((group) => ({ ...group, parts: [...group.parts], shots: [...group.shots] })).sort((a, b) => b.parts.length * b.shots.length - a.parts.length * a.shots.length);
}
