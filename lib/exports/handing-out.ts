import { createHash } from 'node:crypto';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { PartRow } from '@/lib/rules/part-row';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { writeReceipt } from './write-receipt';

/**
 * A verb that answers rows of parts, whose reading by a token is a hand-off with a receipt: one per token, selection, hash and day.
 * The hash is that of the rows as the answer writes them, without what stands around them, so that a poll that brings nothing new
 * leaves no other receipt. Somebody who looks at a page takes nothing away.
 * @param format what the receipt calls the call
 */
export function handingOut<Input extends { show: string }, Output>(format: string, verb: (context: Context, input: Input) => Promise<Output>, rowsOf: (output: Output) => readonly PartRow[]) {
  return async (context: Context, input: Input): Promise<Output> => {
    const output = await verb(context, input);
    const { db, actor } = requireActor(context);
    const rows = rowsOf(output);
    if (actor.tokenId === null || rows.length === 0) return output;
    const { show } = await getShowAccess(db, actor, input.show, 'readShow');
    const bytes = Buffer.from(JSON.stringify(rows), 'utf8');
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const handed = rows.flatMap((row) => (row.part_id === null ? [] : [{ partId: row.part_id, valueSha256: row.value_sha256 }]));
    await writeReceipt(db, actor, { showId: show.id, format, selection: selectionOf(input), rows: rows.length, byteSize: bytes.length, sha256 }, [handed]);
    return output;
  };
}

/** What was asked for, as a canonical query string; its order, and where in the list the reader stood, are no part of it. */
function selectionOf(input: { show: string }): string {
  const asked = Object.entries(input).filter(([name, value]) => !['show', 'cursor', 'limit', 'sort'].includes(name) && value !== undefined);
  return new URLSearchParams(asked.map(([name, value]): [string, string] => [name, Array.isArray(value) ? [...value].sort().join(',') : String(value)]).sort()).toString();
}
