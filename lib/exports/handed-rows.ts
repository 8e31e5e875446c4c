import type { FileHandle } from 'node:fs/promises';
import { CSV_COLUMNS } from '@/lib/rules/csv-columns';
import type { ExportCells } from './export-pages';
import type { HandedRow } from './write-receipt';

/** A row in bytes: the part's id, then its value's SHA-256; zeros where it has no value. */
const ID_BYTES = 16;
const ROW_BYTES = ID_BYTES + 32;
const PAGE_ROWS = 5000;
const NO_VALUE = '0'.repeat(64);

const PART_ID = columnOf('part_id');
const VALUE_SHA256 = columnOf('value_sha256');

function columnOf(name: string): number {
  const index = CSV_COLUMNS.findIndex((column) => column.name === name);
  if (index < 0) throw new Error(`Exports have no column ${name}.`);
  return index;
}

/** Which value of which part each export row is, packed to stand behind the export in its file until a receipt names them. */
export function packHandedRows(rows: readonly ExportCells[]): Buffer {
  return Buffer.from(rows.map((cells) => String(cells[PART_ID]).replaceAll('-', '') + String(cells[VALUE_SHA256] ?? NO_VALUE)).join(''), 'hex');
}

/** The packed rows of a file again, a page at a time, in their order. Errors: where the file ends before them. */
export async function* readHandedRows(file: FileHandle, from: number, count: number): AsyncGenerator<HandedRow[]> {
  for (let row = 0; row < count; row += PAGE_ROWS) {
    const length = Math.min(PAGE_ROWS, count - row) * ROW_BYTES;
    const { buffer, bytesRead } = await file.read(Buffer.alloc(length), 0, length, from + row * ROW_BYTES);
    if (bytesRead < length) throw new Error('An export ends before its rows.');
    yield Array.from({ length: length / ROW_BYTES }, (_, i) => unpack(buffer.subarray(i * ROW_BYTES, (i + 1) * ROW_BYTES)));
  }
}

function unpack(bytes: Buffer): HandedRow {
  const value = bytes.toString('hex', ID_BYTES);
  return { partId: bytes.toString('hex', 0, ID_BYTES), valueSha256: value === NO_VALUE ? null : value };
}
