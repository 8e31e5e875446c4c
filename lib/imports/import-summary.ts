import { and, asc, eq, ne, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import type { NoticeText } from '@/db/schema/notices';
import { counted } from '@/lib/notices/list-words';
import { MENDS, mendOf } from '@/lib/rules/import-mends';
import { placeWords } from '@/lib/rules/import-note';
import type { Show } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import type { ImportRow } from './get-import-row';

const MOST_FAILURES = 12;

/** An import that has ended, in the words of a message: its counts, the first failures with file, place and what mends them. */
export async function importSummary(tx: Transaction, show: Show, row: ImportRow, why: string): Promise<NoticeText> {
  const { counts } = await describeImport(tx, row);
  const failures = await tx
    .select({ name: importFiles.name, code: importFiles.errorCode, message: importFiles.errorMessage, line: importFiles.errorLine, column: importFiles.errorColumn })
    .from(importFiles)
    .where(and(eq(importFiles.importId, row.id), eq(importFiles.state, 'failed'), ne(importFiles.errorCode, 'cancelled')))
    .orderBy(asc(sql`${importFiles.name} collate "C"`))
    .limit(MOST_FAILURES);
  const [{ failed, blocked, unchanged }] = (
    await tx.execute<{ failed: number; blocked: number; unchanged: number }>(sql`
      select count(*) filter (where state = 'failed' and error_code <> 'cancelled')::int as failed, count(*) filter (where problems > 0)::int as blocked,
        count(*) filter (where 'unchanged' = any(string_to_array(remark, ' ')))::int as unchanged
      from import_files where import_id = ${row.id}`)
  ).rows;
  const isCancelled = row.state === 'cancelled';
  const told = [`${counts.done.toLocaleString('en')} measured`, ...(failed > 0 ? [`${failed.toLocaleString('en')} failed`] : [])].join(', ');
  const more = failed - failures.length;
  return {
    subject: `Import ${isCancelled ? 'cancelled' : 'done'}: ${told} (${show.title})`,
    lines: [
      `Your import of ${counted(counts.total, 'file')} into ${show.title} ${isCancelled ? 'was cancelled' : 'has ended'}: ${told}.`,
      [
        ...(unchanged > 0 ? [`${counted(unchanged, 'file')} had the bytes of the current version and changed nothing.`] : []),
        ...(blocked > 0 ? [`${counted(blocked, 'file')} ${blocked === 1 ? 'was' : 'were'} measured and ${blocked === 1 ? 'has' : 'have'} problems that leave parts without a mass.`] : []),
        ...(failed > 0 ? ['What failed, and what mends it:'] : []),
      ].join(' '),
    ].filter((line) => line !== ''),
    list: [
      ...failures.map(({ name, code, message, line, column }) => {
        const place = placeWords({ line, column });
        return `${name}${place === '' ? '' : `, ${place}`}: ${message ?? ''} ${MENDS[mendOf(code ?? '')].act}`;
      }),
      ...(more > 0 ? [`and ${more.toLocaleString('en')} more`] : []),
    ],
    label: 'Open the import',
    path: `/shows/${encodeURIComponent(show.code)}/imports/${row.id}`,
    why,
  };
}
