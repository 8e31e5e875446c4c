import { csvRecord } from '@/lib/formats/csv';
import { CSV_COLUMNS, CSV_SCHEMA } from '@/lib/rules/csv-columns';
import type { ExportCells } from './export-pages';

export type ExportFormat = 'csv' | 'json';

export interface ExportWriter {
  mediaType: string;
  head: (show: string) => string;
  rows: (page: readonly ExportCells[], isFirst: boolean, guard: boolean) => string;
  tail: string;
}

const names = CSV_COLUMNS.map((column) => column.name);

/** How each format writes the same rows. JSON has the CSV's columns as fields, one row a line, and is never guarded. */
export const EXPORT_WRITERS: Record<ExportFormat, ExportWriter> = {
  csv: {
    mediaType: 'text/csv; charset=utf-8; header=present',
    head: () => csvRecord(names, { guard: false }),
    rows: (page, _, guard) => page.map((cells) => csvRecord(cells, { guard })).join(''),
    tail: '',
  },
  json: {
    mediaType: 'application/json; charset=utf-8',
    head: (show) => `{"schema":${JSON.stringify(CSV_SCHEMA)},"show":${JSON.stringify(show)},"items":[`,
    rows: (page, isFirst) => page.map((cells, i) => `${isFirst && i === 0 ? '' : ','}\n${JSON.stringify(Object.fromEntries(names.map((name, j) => [name, cells[j]])))}`).join(''),
    tail: '\n]}\n',
  },
};
