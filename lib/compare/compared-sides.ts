import { sql, type SQL } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { numbersOf } from '@/lib/approvals/compare-with-approvals';
import type { ComparedNumbers } from '@/lib/rules/comparison';
import { STATE_WORDS } from '@/lib/rules/states';
import { computeValue } from '@/lib/values/compute-value';
import { loadValueInputs } from '@/lib/values/load-value-inputs';
import { toComparedNumbers } from './to-compared-numbers';

/** The value of one part on one side. */
export interface PartValue {
  part: string;
  /** Version and scale of the geometry behind it. */
  version: string;
  scale: number;
  /** Of the limit surface. */
  volumeM3: number | null;
  areaM2: number | null;
  numbers: ComparedNumbers | null;
  /** Why there are no numbers. */
  why: string;
  by: string | null;
  at: string | null;
}

/** Parts of a version with what is set on them today, by name. */
export async function valuesOfVersion(db: Executor, assetId: string, versionId: string, part: string | null): Promise<PartValue[]> {
  const loaded = await loadValueInputs(db, [assetId], null, [versionId]);
  return loaded
    .filter((one) => part === null || one.part === part)
    .map((one) => {
      const value = computeValue(one);
      const { properties } = value;
      const shared = { part: one.part, version: one.version, scale: one.scale, volumeM3: value.volumeM3, areaM2: value.areaM2, by: null, at: null };
      if (!properties) return { ...shared, numbers: null, why: STATE_WORDS[value.state] };
      return { ...shared, numbers: toComparedNumbers(properties, value.boundsM), why: '' };
    });
}

interface StoredValue extends Record<string, unknown> {
  part: string;
  version: string;
  scale: number;
  numbers: ComparedNumbers;
  volume_m3: number | null;
  area_m2: number | null;
  by: string;
  at: string;
}

async function storedValues(db: Executor, from: SQL): Promise<PartValue[]> {
  const { rows } = await db.execute<StoredValue>(from);
  return rows.map(({ part, version, scale, numbers, volume_m3, area_m2, by, at }) => ({ part, version, scale, volumeM3: volume_m3, areaM2: area_m2, numbers, why: '', by, at: new Date(at).toISOString() }));
}

/** The newest standing approval of each part, or of one, by name. */
export function approvedValues(db: Executor, assetId: string, part: string | null): Promise<PartValue[]> {
  const only = part === null ? sql`` : sql`and p.name = ${part}`;
  return storedValues(db, sql`
    select distinct on (p.name) p.name as part, a.version, a.scale, ${numbersOf('a')} as numbers, a.volume_m3, a.area_m2, u.name as by, a.approved_at as at
    from approvals a join parts p on p.id = a.part_id join users u on u.id = a.approved_by
    where a.asset_id = ${assetId} and a.shot_id is null ${only} and not exists (select 1 from withdrawals w where w.approval_id = a.id)
    order by p.name, a.ordinal desc`);
}

/** The approval that a lock is to. */
export function lockedValue(db: Executor, lockId: string): Promise<PartValue[]> {
  return storedValues(db, sql`
    select a.part, a.version, a.scale, ${numbersOf('a')} as numbers, a.volume_m3, a.area_m2, u.name as by, a.approved_at as at
    from locks l join approvals a on a.id = l.approval_id join users u on u.id = a.approved_by where l.id = ${lockId}`);
}

/** The override that stands for a part in a shot; none where the shot uses the part's own value. */
export function overrideValue(db: Executor, shotId: string, assetId: string, part: string): Promise<PartValue[]> {
  return storedValues(db, sql`
    select o.part, o.version, o.scale, ${numbersOf('o')} as numbers, o.volume_m3, o.area_m2, u.name as by, o.drafted_at as at
    from shot_overrides o join parts p on p.id = o.part_id join users u on u.id = o.drafted_by
    where o.shot_id = ${shotId} and p.asset_id = ${assetId} and p.name = ${part} and o.dropped_at is null and o.mass_kg is not null`);
}
