import type { Transaction } from '@/db/client';
import { members } from '@/db/schema/members';
import { shows } from '@/db/schema/shows';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { ActorContext, Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { CreateShowInput } from '@/lib/rules/inputs/create-show';
import { StudioError } from '@/lib/rules/studio-error';
import { findOrMakeUser } from '@/lib/users/find-or-make-user';
import type { Show } from './get-show-access';
import { showAnswer } from './show-answer';
import { tellMember } from './tell-member';

/** Makes a show, with its leads where they are named. Throws already_exists for a code that is taken, in any case of letters. */
export async function createShow(context: Context, input: CreateShowInput): Promise<ReturnType<typeof showAnswer>> {
  const known = requireAdmin(context, 'createShow');
  return known.db.transaction(async (tx) => {
    const [show] = await tx
      .insert(shows)
      .values({
        code: input.code,
        title: input.title,
        linearUnit: input.linear_unit,
        upAxis: input.up_axis,
        scheme: input.scheme,
        boundary: input.boundary,
        partsBy: input.parts_by,
        selfApproval: input.self_approval,
      })
      .onConflictDoNothing()
      .returning();
    if (!show) throw new StudioError('already_exists', `There is a show ${input.code} already.`, { field: 'code' });
    const answer = showAnswer(show);
    const items = (['title', 'linear_unit', 'up_axis', 'scheme', 'boundary', 'parts_by', 'self_approval'] as const).map((field) => ({
      field,
      before: null,
      after: String(answer[field]),
    }));
    await recordEvent(tx, known, { showId: show.id, act: 'create-show', subject: show.code, items });
    for (const email of new Set(input.leads)) await addLead(tx, known, show, email);
    return answer;
  });
}

async function addLead(tx: Transaction, known: ActorContext, show: Show, email: string): Promise<void> {
  const { user } = await findOrMakeUser(tx, email, undefined);
  await tx.insert(members).values({ showId: show.id, userId: user.id, role: 'lead' });
  await recordEvent(tx, known, { showId: show.id, act: 'set-member', subject: user.email, items: [{ field: 'role', before: null, after: 'lead' }] });
  await tellMember(tx, known.actor, user, show, 'lead');
}
