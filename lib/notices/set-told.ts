import { and, eq } from 'drizzle-orm';
import { peopleTold } from '@/db/schema/people-told';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { SetToldInput } from '@/lib/rules/inputs/set-told';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { atPlace, findPlace } from './told-place';

/** The caller asks to be told of a show, a shot or an asset, or not any more. Twice is as once. */
export async function setTold(context: Context, input: SetToldInput): Promise<{ told: boolean }> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'readShow');
  const { userId } = acting.actor;
  return acting.db.transaction(async (tx) => {
    const place = await findPlace(tx, show, input);
    const changed = input.told
      ? await tx.insert(peopleTold).values({ showId: show.id, userId, shotId: place.shotId, assetId: place.assetId }).onConflictDoNothing().returning({ id: peopleTold.id })
      : await tx.delete(peopleTold).where(and(atPlace(show.id, place), eq(peopleTold.userId, userId))).returning({ id: peopleTold.id });
    if (changed.length > 0) await recordEvent(tx, acting, { showId: show.id, act: 'set-told', subject: place.name, items: [{ shotId: place.shotId, field: 'told', before: String(!input.told), after: String(input.told) }] });
    return { told: input.told };
  });
}
