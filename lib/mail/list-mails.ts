import { desc } from 'drizzle-orm';
import { mails } from '@/db/schema/mails';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import type { ListMailsInput } from '@/lib/rules/inputs/list-mails';

export const MAILS_PER_PAGE = 50;

export interface ListedMail {
  id: string;
  to: string;
  subject: string;
  /** Of a message that stays here; what was sent may hold a link that only its reader should follow. */
  text: string | null;
  state: 'waiting' | 'sent' | 'local' | 'failed';
  error: string | null;
  created_at: string;
}

/** The studio's messages, the newest first, a page at a time. */
export async function listMails(context: Context, input: ListMailsInput): Promise<{ items: ListedMail[]; more: boolean }> {
  const { db } = requireAdmin(context, 'readStudio');
  const rows = await db
    .select()
    .from(mails)
    .orderBy(desc(mails.createdAt), desc(mails.id))
    .limit(MAILS_PER_PAGE + 1)
    .offset((input.page - 1) * MAILS_PER_PAGE);
  const items = rows.slice(0, MAILS_PER_PAGE).map((row) => ({
    id: row.id,
    to: row.toEmail,
    subject: row.subject,
    text: row.state === 'local' ? row.text : null,
    state: row.state,
    error: row.error,
    created_at: row.createdAt.toISOString(),
  }));
  return { items, more: rows.length > MAILS_PER_PAGE };
}
