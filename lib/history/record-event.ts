import type { Transaction } from '@/db/client';
import { auditEvents } from '@/db/schema/audit-events';
import { auditItems } from '@/db/schema/audit-items';
import { SYSTEM_USER_ID } from '@/lib/auth/system-context';
import type { ActorContext } from '@/lib/context';

export interface ChangedField {
  partId?: string | null;
  field: string;
  before: string | null;
  after: string | null;
}

/** Writes one act and the fields it changed to the history, within the change's own transaction. */
export async function recordEvent(
  tx: Transaction,
  context: Pick<ActorContext, 'actor' | 'origin'>,
  event: { showId: string | null; act: string; subject: string; reason?: string | null; items?: ChangedField[] },
): Promise<number> {
  const items = event.items ?? [];
  const [row] = await tx
    .insert(auditEvents)
    .values({
      showId: event.showId,
      actorId: context.actor.userId === SYSTEM_USER_ID ? null : context.actor.userId,
      act: event.act,
      origin: context.origin,
      subject: event.subject,
      reason: event.reason ?? null,
      items: items.length,
    })
    .returning({ id: auditEvents.id });
  for (let start = 0; start < items.length; start += 5000) {
    const chunk = items.slice(start, start + 5000);
    await tx.insert(auditItems).values(
      chunk.map((item) => ({ eventId: row.id, partId: item.partId ?? null, field: item.field, before: item.before, after: item.after })),
    );
  }
  return row.id;
}
