/** Which rows are chosen, where a range starts, and where the keyboard stands. */
export interface RowSelection {
  chosen: ReadonlySet<string>;
  anchor: string | null;
  active: string | null;
}

export const NO_SELECTION: RowSelection = { chosen: new Set(), anchor: null, active: null };

/** A row as the selection sees it: choosing an asset chooses its parts. */
export interface SelectableRow {
  key: string;
  /** Keys of the parts that it stands for: its own, or those of an asset. */
  parts: readonly string[];
}

export type SelectHow = 'only' | 'toggle' | 'range';

/** The rows between two keys, both included, in the order shown. */
function between(rows: readonly SelectableRow[], from: string | null, to: string): SelectableRow[] {
  const end = rows.findIndex((row) => row.key === to);
  const start = rows.findIndex((row) => row.key === from);
  if (end < 0) return [];
  if (start < 0) return [rows[end]];
  return rows.slice(Math.min(start, end), Math.max(start, end) + 1);
}

/** Chooses a row alone, adds or takes away a row, or chooses from the anchor to the row. */
export function selectRow(
  selection: RowSelection,
  rows: readonly SelectableRow[],
  key: string,
  how: SelectHow,
): RowSelection {
  const row = rows.find((one) => one.key === key);
  if (row === undefined) return selection;
  if (how === 'range') {
    const parts = between(rows, selection.anchor ?? selection.active, key).flatMap((one) => one.parts);
    return { chosen: new Set(parts), anchor: selection.anchor ?? selection.active ?? key, active: key };
  }
  if (how === 'only') return { chosen: new Set(row.parts), anchor: key, active: key };
  const chosen = new Set(selection.chosen);
  const all = row.parts.every((part) => chosen.has(part));
  for (const part of row.parts) {
    if (all) chosen.delete(part);
    else chosen.add(part);
  }
  return { chosen, anchor: key, active: key };
}

/** Moves the keyboard's place by `steps` rows; `extend` chooses from the anchor to there. */
export function moveActive(
  selection: RowSelection,
  rows: readonly SelectableRow[],
  steps: number,
  extend: boolean,
): RowSelection {
  if (rows.length === 0) return selection;
  const here = rows.findIndex((row) => row.key === selection.active);
  const next = here < 0 ? (steps < 0 ? rows.length - 1 : 0) : Math.min(rows.length - 1, Math.max(0, here + steps));
  const { key } = rows[next];
  if (extend) return selectRow({ ...selection, anchor: selection.anchor ?? selection.active }, rows, key, 'range');
  return { ...selection, active: key, anchor: key };
}
