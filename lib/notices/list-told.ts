import { and, asc, eq, sql } from 'drizzle-orm';
import { assets } from '@/db/schema/assets';
import { members } from '@/db/schema/members';
import { peopleTold } from '@/db/schema/people-told';
import { shots } from '@/db/schema/shots';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ToldPlace } from '@/lib/rules/told';

/** What the caller asked to be told of, in the shows that they are in. */
export async function listTold(context: Context): Promise<ToldPlace[]> {
  const { db, actor } = requireActor(context);
  return db
    .select({ show: shows.code, title: shows.title, shot: shots.code, asset: assets.code })
    .from(peopleTold)
    .innerJoin(shows, eq(shows.id, peopleTold.showId))
    .leftJoin(shots, eq(shots.id, peopleTold.shotId))
    .leftJoin(assets, eq(assets.id, peopleTold.assetId))
    .where(
      and(
        eq(peopleTold.userId, actor.userId),
        actor.isAdmin ? undefined : sql`exists (select 1 from ${members} where ${members.userId} = ${actor.userId} and ${members.showId} = ${shows.id} and ${members.role} <> 'guest')`,
      ),
    )
    .orderBy(asc(shows.title), asc(shows.code), sql`${shots.code} nulls first`, sql`${assets.code} nulls first`);
}
