import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { auditEvents } from '@/db/schema/audit-events';
import { SYSTEM_USER_ID } from '@/lib/auth/system-context';
import type { ActorContext } from '@/lib/context';

export interface ChangedField {
  partId?: string | null;
  /** Of a lock, an override, or what is in a shot. */
  shotId?: string | null;
  field: string;
  before: string | null;
  after: string | null;
}

/** Writes one act and the fields it changed to the history, within the change's own transaction. Answers the act's id. */
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
  if (items.length > 0) {
    const rows = items.map((item) => ({ part_id: item.partId ?? null, shot_id: item.shotId ?? null, field: item.field, before: item.before, after: item.after }));
    await tx.execute(sql`
      insert into audit_items (event_id, part_id, shot_id, field, before, after)
      select ${row.id}::bigint, part_id, shot_id, field, before, after
      from json_to_recordset(${JSON.stringify(rows)}::json) as given(part_id uuid, shot_id uuid, field text, before text, after text)`);
  }
  return row.id;
}
