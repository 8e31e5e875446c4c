import { sql, type SQL } from 'drizzle-orm';
import type { ListShotsInput } from '@/lib/rules/inputs/list-shots';

export type ShotWords = Partial<Pick<ListShotsInput, 'sequence' | 'asset' | 'q'>>;

/** The shots (alias s) of one show that the words let through: the one place where the show's scope is set for lists of shots. */
export function shotFilter(showId: string, { sequence, asset, q }: ShotWords): SQL {
  const conditions = [
    sql`s.show_id = ${showId}`,
    ...(sequence === undefined ? [] : [sql`s.sequence = ${sequence}`]),
    ...(asset === undefined ? [] : [sql`exists (select 1 from shot_assets i join assets a on a.id = i.asset_id where i.shot_id = s.id and a.code = ${asset} collate "C")`]),
    ...(q ?? '').split(/\s+/).filter((word) => word !== '').map((word) => sql`concat_ws(' ', s.sequence, s.code, s.title) ilike ${`%${word.replace(/[\\%_]/g, '\\$&')}%`}`),
  ];
  return sql.join(conditions, sql` and `);
}
