import { and, desc, eq, sql } from 'drizzle-orm';
import { apiTokens } from '@/db/schema/api-tokens';
import { receipts } from '@/db/schema/receipts';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ReceiptPage } from '@/lib/rules/export-preview';
import type { ListReceiptsInput } from '@/lib/rules/inputs/list-receipts';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';

const CURSOR = /^(\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{6}Z),([0-9a-f-]{36})$/;

export function isReceiptCursor(text: string): boolean {
  return CURSOR.test(text);
}

/** Who took which rows of the show, when, and with which checksum; newest first. */
export async function listReceipts(context: Context, input: ListReceiptsInput): Promise<ReceiptPage> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const cursor = input.cursor === undefined ? null : CURSOR.exec(input.cursor);
  if (input.cursor !== undefined && !cursor) throw new StudioError('bad_input', 'cursor: This is no cursor of this list.', { field: 'cursor' });
  const rows = await db
    .select({ receipt: receipts, takenBy: users.name, token: apiTokens.name, at: sql<string>`to_char(${receipts.createdAt} at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')` })
    .from(receipts)
    .innerJoin(users, eq(users.id, receipts.userId))
    .leftJoin(apiTokens, eq(apiTokens.id, receipts.tokenId))
    .where(and(eq(receipts.showId, show.id), cursor ? sql`(${receipts.createdAt}, ${receipts.id}) < (${cursor[1]}::timestamptz, ${cursor[2]}::uuid)` : undefined))
    .orderBy(desc(receipts.createdAt), desc(receipts.id))
    .limit(input.limit + 1);
  const page = rows.slice(0, input.limit);
  const last = page.at(-1);
  return {
    items: page.map(({ receipt, takenBy, token }) => ({
      id: receipt.id,
      taken_at: receipt.createdAt.toISOString(),
      taken_by: takenBy,
      token,
      format: receipt.format,
      selection: receipt.selection,
      rows: receipt.rows,
      bytes: receipt.byteSize,
      sha256: receipt.sha256,
    })),
    next_cursor: rows.length > input.limit && last ? `${last.at},${last.receipt.id}` : null,
  };
}
