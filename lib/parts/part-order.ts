import { sql, type AnyColumn, type SQL } from 'drizzle-orm';
import { partCurrent as c } from '@/db/schema/part-current';
import { PART_SORTS, type ListPartsInput, type PartSort } from '@/lib/rules/inputs/list-parts';
import { VALUE_STATES } from '@/lib/rules/states';
import { StudioError } from '@/lib/rules/studio-error';
import { encodeCursor, type PartCursor } from './part-cursor';
import type { StoredRow } from './row-columns';

interface SortColumn {
  expression: SQL;
  type: 'text' | 'float8' | 'timestamptz' | 'integer';
  valueOf: (row: StoredRow) => string | number | null;
}

const text = (column: AnyColumn): SQL => sql`${column} collate "C"`;
const number = (column: AnyColumn, valueOf: SortColumn['valueOf']): SortColumn => ({ expression: sql`${column}`, type: 'float8', valueOf });

const ISO_TIME = /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/;
const ASSET = text(c.asset);
const PART = text(c.part);

const COLUMNS: Record<PartSort, SortColumn> = {
  asset: { expression: ASSET, type: 'text', valueOf: (row) => row.asset },
  part: { expression: PART, type: 'text', valueOf: (row) => row.part },
  category: { expression: text(c.category), type: 'text', valueOf: (row) => row.category },
  version: { expression: text(c.version), type: 'text', valueOf: (row) => row.version },
  state: {
    expression: sql`array_position(array[${sql.raw(VALUE_STATES.map((state) => `'${state}'`).join(', '))}], ${c.state})`,
    type: 'integer',
    valueOf: (row) => VALUE_STATES.findIndex((state) => state === row.state) + 1,
  },
  construction: { expression: text(c.construction), type: 'text', valueOf: (row) => row.construction },
  material: { expression: text(c.material), type: 'text', valueOf: (row) => row.material },
  mass_kg: number(c.massKg, (row) => row.mass_kg),
  density_kg_m3: number(c.densityKgPerM3, (row) => row.density_kg_m3),
  volume_m3: number(c.volumeM3, (row) => row.volume_m3),
  area_m2: number(c.areaM2, (row) => row.area_m2),
  com_x_m: number(c.comXM, (row) => row.com_x_m),
  com_y_m: number(c.comYM, (row) => row.com_y_m),
  com_z_m: number(c.comZM, (row) => row.com_z_m),
  i1_kg_m2: number(c.i1KgM2, (row) => row.i1_kg_m2),
  i2_kg_m2: number(c.i2KgM2, (row) => row.i2_kg_m2),
  i3_kg_m2: number(c.i3KgM2, (row) => row.i3_kg_m2),
  faces: { expression: sql`${c.faces}`, type: 'integer', valueOf: (row) => row.faces },
  set_at: { expression: sql`date_trunc('milliseconds', ${c.setAt})`, type: 'timestamptz', valueOf: (row) => row.set_at },
};

/**
 * The order of a list: the sorted column either way with rows that lack it last, then asset and part, which are unique together in
 * a show. `after` is the condition of the rows behind a cursor.
 */
export function partOrder(sort: ListPartsInput['sort']): { orderBy: SQL; after: (cursor: PartCursor) => SQL; cursorOf: (row: StoredRow) => string } {
  const descending = sort.startsWith('-');
  const name = PART_SORTS.find((one) => one === sort.replace(/^-/, '')) ?? 'asset';
  const { expression, type, valueOf } = COLUMNS[name];
  const cursorOf = (row: StoredRow): string => encodeCursor({ sort, value: valueOf(row), asset: row.asset, part: row.part });
  const behind = (cursor: PartCursor): SQL => sql`(${ASSET}, ${PART}) > (${cursor.asset}::text collate "C", ${cursor.part}::text collate "C")`;
  if (name === 'asset' && !descending) return { orderBy: sql`${ASSET}, ${PART}`, after: behind, cursorOf };
  const direction = sql.raw(descending ? 'desc' : 'asc');
  const compare = sql.raw(descending ? '<' : '>');
  const collation = sql.raw(type === 'text' ? ' collate "C"' : '');
  return {
    orderBy: sql`${expression} ${direction} nulls last, ${ASSET}, ${PART}`,
    after: (cursor) => {
      if (cursor.value === null) return sql`(${expression} is null and ${behind(cursor)})`;
      const fits = type === 'text' ? typeof cursor.value === 'string' : type === 'timestamptz' ? ISO_TIME.test(String(cursor.value)) : typeof cursor.value === 'number';
      if (!fits) throw new StudioError('bad_input', 'cursor: This is no cursor of this list.', { field: 'cursor' });
      const value = sql`${String(cursor.value)}::text::${sql.raw(type)}${collation}`;
      return sql`(${expression} ${compare} ${value} or (${expression} = ${value} and ${behind(cursor)}) or ${expression} is null)`;
    },
    cursorOf,
  };
}
