import { and, desc, eq, gte, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { auditEvents } from '@/db/schema/audit-events';
import { imports } from '@/db/schema/imports';
import { shows } from '@/db/schema/shows';
import { config } from '@/lib/config';
import { tellPeople } from '@/lib/notices/tell-people';
import type { ImportRow } from './get-import-row';
import { importSummary } from './import-summary';
import { LEFT_AFTER_S } from './note-watching';

/** An import that was left is written about only where it went on for so long: who looks away for a moment needs no message. */
const SHORTEST_LEFT_S = 60;

/**
 * Tells the person who opened an import of its end, as they chose to get mail and once however often this runs: when it took long
 * (by configuration), when they had left its page, and when somebody else cancelled it. Answers how many are told.
 * @param since of an import whose failed files were tried again: when. Its time counts from there
 */
export async function tellImporter(tx: Transaction, { importId, since }: { importId: string; since: string | null }): Promise<number> {
  const [found] = await tx.select({ row: imports, show: shows }).from(imports).innerJoin(shows, eq(shows.id, imports.showId)).where(eq(imports.id, importId));
  if (!found || found.row.endedAt === null) return 0;
  const { row, show } = found;
  const why = await whyTold(tx, row, since);
  if (why === null) return 0;
  const tellings = [{ userIds: [row.createdBy], text: await importSummary(tx, show, row, why) }];
  return tellPeople(tx, { showId: show.id, actorId: null, key: since === null ? `import-end:${importId}` : `import-end:${importId}:${since}`, tellings });
}

async function whyTold(tx: Transaction, row: ImportRow, since: string | null): Promise<string | null> {
  if (row.state === 'cancelled') {
    const [cancelled] = await tx
      .select({ by: auditEvents.actorId })
      .from(auditEvents)
      .where(and(eq(auditEvents.showId, row.showId), eq(auditEvents.act, 'cancel-import'), eq(auditEvents.subject, row.id)))
      .orderBy(desc(auditEvents.id))
      .limit(1);
    return cancelled && cancelled.by !== row.createdBy ? 'You are told because somebody else cancelled your import.' : null;
  }
  const began = since === null ? row.submittedAt : new Date(since);
  if (began === null || row.endedAt === null) return null;
  const tookS = (row.endedAt.getTime() - began.getTime()) / 1000;
  if (tookS >= config().longImportMinutes * 60) return 'You are told because your import took long.';
  if (tookS < SHORTEST_LEFT_S || !(await wasBegunByHand(tx, row, began))) return null;
  const hasLeft = row.watchedAt === null || row.endedAt.getTime() - row.watchedAt.getTime() > LEFT_AFTER_S * 1000;
  return hasLeft ? 'You are told because you left your import before its end.' : null;
}

/** Whether a person submitted it, or tried its failures again, from a page: scripts watch in their own way. */
async function wasBegunByHand(tx: Transaction, row: ImportRow, began: Date): Promise<boolean> {
  const [begun] = await tx
    .select({ origin: auditEvents.origin })
    .from(auditEvents)
    .where(
      and(
        eq(auditEvents.showId, row.showId),
        sql`${auditEvents.act} in ('submit-import', 'retry-import')`,
        eq(auditEvents.subject, row.id),
        gte(auditEvents.at, sql`${began.toISOString()}::timestamptz - interval '1 second'`),
      ),
    )
    .orderBy(desc(auditEvents.id))
    .limit(1);
  return begun?.origin === 'hand';
}
