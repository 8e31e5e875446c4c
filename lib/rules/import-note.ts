import { MEND_ORDER, MENDS, mendOf, type Mend } from './import-mends';
import type { ReportRow } from './import-report';

/** Files that a note names under one heading, and rows of one file: more are counted, and stand in the report. */
const MOST_FILES = 40;
const MOST_ROWS = 3;

/** Where an error sits, as people say it; empty where the whole file is meant. */
export function placeWords(error: { line: number | null; column: number | null }): string {
  if (error.line === null) return '';
  return error.column === null ? `line ${error.line}` : `line ${error.line}, column ${error.column}`;
}

/** Whether a row is for whoever made the file: what failed, what blocks a mass, and a unit that is doubted. */
function isForModelling(row: ReportRow): boolean {
  if (row.code === null) return false;
  return row.severity === 'problem' || (row.severity === 'warning' && row.code.startsWith('unit_'));
}

/**
 * What failed and what blocks a mass, as a message to whoever made the files: plain text, grouped by what mends it, the largest
 * group first of those that modelling can mend. Empty where nothing is wrong.
 * @param link address of the import, where the report is
 */
export function noteToModelling(show: string, rows: readonly ReportRow[], link: string): string {
  const wrong = rows.filter(isForModelling);
  if (wrong.length === 0) return '';
  const groups = MEND_ORDER.map((mend) => ({ mend, files: byFile(wrong.filter((row) => mendOf(row.code!) === mend)) }))
    .filter((group) => group.files.size > 0)
    .sort((a, b) => Number(a.mend === 'ours') - Number(b.mend === 'ours') || b.files.size - a.files.size);
  const files = new Set(wrong.map((row) => row.file)).size;
  return [
    `${show}: ${files === 1 ? '1 file' : `${files} files`} to look at`,
    ...(groups.length > 1 ? [groups.map((group) => `${MENDS[group.mend].title}: ${group.files.size}`).join('\n')] : []),
    ...groups.map((group) => groupText(group.mend, group.files)),
    `All of it, as a table to download: ${link}`,
    '',
  ]
    .join('\n\n')
    .trimEnd()
    .concat('\n');
}

function byFile(rows: readonly ReportRow[]): Map<string, ReportRow[]> {
  const files = new Map<string, ReportRow[]>();
  for (const row of rows) files.set(row.file, [...(files.get(row.file) ?? []), row]);
  return files;
}

function groupText(mend: Mend, files: ReadonlyMap<string, readonly ReportRow[]>): string {
  const { title, act } = MENDS[mend];
  const heading = `${title} (${files.size === 1 ? '1 file' : `${files.size} files`})`;
  const shown = [...files].slice(0, MOST_FILES).map(([file, rows]) => fileText(file, rows));
  const more = files.size - shown.length;
  return [`${heading}\n${'-'.repeat(heading.length)}\n${act}`, shown.join('\n'), ...(more > 0 ? [`and ${more === 1 ? '1 more file' : `${more} more files`}, all in the report`] : [])].join('\n\n');
}

function fileText(file: string, rows: readonly ReportRow[]): string {
  const lines = rows.slice(0, MOST_ROWS).map((row) => {
    const place = [row.part, placeWords(row)].filter(Boolean).join(', ');
    return `  ${place === '' ? '' : `${place}: `}${row.message ?? ''}`;
  });
  const more = rows.length - lines.length;
  return [file, ...lines, ...(more > 0 ? [`  and ${more} more`] : [])].join('\n');
}
