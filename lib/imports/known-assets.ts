import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { optionsWord, type KnownAsset, type KnownContent } from '@/lib/rules/known-asset';
import type { Category } from '@/lib/rules/states';

interface Found extends Record<string, unknown> {
  asset: string;
  category: Category;
  read_name: string | null;
  read_place: string | null;
  versions: number[];
  contents: FoundContent[];
}

type FoundContent = Omit<KnownContent, 'options'> & { scheme: string; boundary: string; triangles: string; creasing: string; parts_by: string; weld: boolean; turn_faces: boolean };

/**
 * The show's assets with what names have to be held against: their versions, the folders that their files came from, and the newest take
 * of each number. Files that wait in submitted imports count as if they were through, so that two imports never mean one new asset by
 * two different things. Two queries.
 */
export async function knownAssets(db: Executor, showId: string): Promise<KnownAsset[]> {
  const { rows } = await db.execute<Found>(sql`
    select a.code as asset, a.category, a.read_name, a.read_place,
      coalesce((select json_agg(v.number) from asset_versions v where v.asset_id = a.id), '[]') as versions,
      coalesce((
        select json_agg(json_build_object('number', n.number, 'take', n.take, 'bytes', b.byte_size, 'sha256', r.content_sha256, 'scheme', r.scheme, 'boundary', r.boundary,
          'triangles', r.triangles, 'creasing', r.creasing, 'parts_by', r.parts_by, 'weld', r.weld, 'turn_faces', r.turn_faces))
        from (select distinct on (number) number, take, record_id from asset_versions v where v.asset_id = a.id order by number, take desc) n
        join geometry_records r on r.id = n.record_id
        join blobs b on b.sha256 = r.content_sha256
        where r.beside_sha256 = ''
      ), '[]') as contents
    from assets a where a.show_id = ${showId} order by a.code collate "C"`);
  const known = new Map<string, KnownAsset>(rows.map((row) => [row.asset, toKnownAsset(row)]));
  for (const waiting of await waitingPlans(db, showId)) {
    const { asset, category, version, readName, place } = waiting;
    const entry = known.get(asset) ?? { asset, category, versions: [], name: readName ?? asset, places: [] };
    known.set(asset, { ...entry, versions: version === null ? entry.versions : [...entry.versions, version], places: [...new Set([...(entry.places ?? []), ...(place === '' ? [] : [place])])] });
  }
  return [...known.values()];
}

function toKnownAsset(row: Found): KnownAsset {
  return {
    asset: row.asset,
    category: row.category,
    versions: row.versions,
    name: row.read_name ?? row.asset,
    places: row.read_place === null || row.read_place === '' ? [] : row.read_place.split('\n'),
    contents: row.contents.map(({ number, take, bytes, sha256, parts_by: partsBy, turn_faces: turnFaces, ...options }) => ({ number, take, bytes, sha256, options: optionsWord({ ...options, partsBy, turnFaces }) })),
  };
}

interface WaitingPlan extends Record<string, unknown> {
  asset: string;
  category: Category;
  version: number | null;
  readName: string | null;
  place: string;
}

async function waitingPlans(db: Executor, showId: string): Promise<WaitingPlan[]> {
  const { rows } = await db.execute<WaitingPlan>(sql`
    select f.plan ->> 'asset' as asset, f.plan ->> 'category' as category, (f.plan ->> 'version')::integer as version, f.plan ->> 'readName' as "readName", coalesce(f.plan ->> 'place', '') as place
    from import_files f join imports i on i.id = f.import_id
    where i.show_id = ${showId} and i.state in ('queued', 'running') and f.state in ('queued', 'reading', 'measuring') and f.plan ->> 'asset' is not null
    order by f.name collate "C"`);
  return rows;
}
