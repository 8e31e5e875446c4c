import { and, asc, eq, isNull, or, sql } from 'drizzle-orm';
import { members } from '@/db/schema/members';
import { peopleTold } from '@/db/schema/people-told';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { GetToldInput } from '@/lib/rules/inputs/set-told';
import type { ToldAnswer } from '@/lib/rules/told';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { atPlace, findPlace } from './told-place';

/** Who is told of a show, a shot or an asset: those who asked for it, and those who asked for the whole show. */
export async function getTold(context: Context, input: GetToldInput): Promise<ToldAnswer> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const place = await findPlace(db, show, input);
  const rows = await db
    .select({ id: users.id, name: users.name, email: users.email, ofShow: sql<boolean>`${peopleTold.shotId} is null and ${peopleTold.assetId} is null` })
    .from(peopleTold)
    .innerJoin(users, eq(users.id, peopleTold.userId))
    .where(
      and(
        or(atPlace(show.id, place), and(eq(peopleTold.showId, show.id), isNull(peopleTold.shotId), isNull(peopleTold.assetId))),
        isNull(users.disabledAt),
        sql`(${users.isAdmin} or exists (select 1 from ${members} where ${members.userId} = ${users.id} and ${members.showId} = ${show.id}))`,
      ),
    )
    .orderBy(asc(sql`lower(${users.name})`), asc(users.email));
  const isShow = place.shotId === null && place.assetId === null;
  const own = rows.filter((row) => row.id === actor.userId);
  return {
    told: own.some((row) => row.ofShow === isShow),
    told_of_show: own.some((row) => row.ofShow),
    people: [...new Map(rows.map(({ id, name, email }) => [id, { name, email }])).values()],
  };
}
