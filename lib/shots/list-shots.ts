import { sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { readCursor, writeCursor } from '@/lib/http/cursor-text';
import type { ListShotsInput, ShotFilter } from '@/lib/rules/inputs/list-shots';
import type { AssetInShot, ShotPage } from '@/lib/rules/shot-detail';
import { shotVerdict } from '@/lib/rules/shot-words';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { shotFilter } from './shot-filter';
import { shotStanding } from './shot-standing';

/** Sequence and code of the last shot. */
const cursorShape = z.tuple([z.string(), z.string()]);

interface FoundShot extends Record<string, unknown> {
  code: string;
  sequence: string;
  title: string | null;
  assets: AssetInShot[] | null;
  locked: number;
  missing: number;
  outdated: number;
  overrides: number;
}

const IN_STATE: Record<ShotFilter, SQL> = {
  missing: sql`t.missing > 0`,
  outdated: sql`t.outdated > 0`,
  complete: sql`t.missing = 0 and t.outdated = 0 and t.locked > 0`,
};

const ORDER = sql`s.sequence collate "C", s.code collate "C"`;

/**
 * A page of a show's shots by sequence and code, each with its assets and what is locked, missing and out of date. One query.
 * Without a state to look for, only the page's own shots are counted.
 * Errors: not_found for outsiders and guests, bad_input naming the field for what the query cannot say.
 */
export async function listShots(context: Context, input: ListShotsInput): Promise<ShotPage> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const cursor = input.cursor === undefined ? null : readCursor(input.cursor, cursorShape);
  const behind = cursor === null ? sql`true` : sql`(s.sequence collate "C", s.code collate "C") > (${cursor[0]}::text collate "C", ${cursor[1]}::text collate "C")`;
  const wanted = sql`${shotFilter(show.id, input)} and ${behind}`;
  const limit = sql`limit ${input.limit + 1}`;
  const { rows } = await db.execute<FoundShot>(sql`
    with chosen as materialized (select s.id, s.code, s.sequence, s.title from shots s where ${wanted} order by ${ORDER} ${input.state === undefined ? limit : sql``}),
      standing as materialized (${shotStanding(show.id, sql`select id from chosen`)})
    select s.code, s.sequence, s.title, t.assets, coalesce(t.locked, 0) as locked, coalesce(t.missing, 0) as missing, coalesce(t.outdated, 0) as outdated, coalesce(t.overrides, 0) as overrides
    from chosen s left join standing t on t.shot_id = s.id
    where ${input.state === undefined ? sql`true` : IN_STATE[input.state]}
    order by ${ORDER} ${limit}`);
  const page = rows.slice(0, input.limit);
  const last = page.at(-1);
  return {
    items: page.map(({ code, sequence, title, assets, locked, missing, outdated, overrides }) => ({ code, sequence, title, assets: assets ?? [], locked, missing, outdated, overrides, verdict: shotVerdict({ locked, missing, outdated }) })),
    next_cursor: rows.length > input.limit && last ? writeCursor([last.sequence, last.code]) : null,
  };
}
