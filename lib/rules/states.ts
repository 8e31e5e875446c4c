/** States of a value, in the order of a show's progress rule. `locked` is a row's state in a shot and never stored here. */
export const VALUE_STATES = ['approved', 'measured', 'outdated', 'unset', 'blocked', 'left_out'] as const;
export type ValueState = (typeof VALUE_STATES)[number];
export type RowState = ValueState | 'locked';

export const STATE_WORDS: Record<RowState, string> = {
  unset: 'no mass yet',
  blocked: 'blocked',
  measured: 'measured',
  approved: 'approved',
  outdated: 'out of date',
  left_out: 'left out',
  locked: 'locked',
};

/** Life of an import. `done` once every file has ended, whatever its end. */
export const IMPORT_STATES = ['open', 'queued', 'running', 'done', 'cancelled'] as const;
export type ImportState = (typeof IMPORT_STATES)[number];

export const IMPORT_FILE_STATES = ['queued', 'reading', 'measuring', 'done', 'failed'] as const;
export type ImportFileState = (typeof IMPORT_FILE_STATES)[number];

export const CATEGORIES = ['creature', 'prop', 'costume', 'set', 'vehicle', 'other'] as const;
export type Category = (typeof CATEGORIES)[number];

export const CATEGORY_WORDS: Record<Category, string> = {
  creature: 'creature',
  prop: 'prop',
  costume: 'costume',
  set: 'set piece',
  vehicle: 'vehicle',
  other: 'other',
};

export const CONSTRUCTIONS = ['solid', 'hollow', 'sheet'] as const;
export type Construction = (typeof CONSTRUCTIONS)[number];

/** What a mass comes from; where several are given, the first of this order wins. */
export const MASS_SOURCES = ['target_mass', 'density', 'material', 'areal_density'] as const;
export type MassSource = (typeof MASS_SOURCES)[number];

/** Where a change came from. */
export const ORIGINS = ['hand', 'rule', 'spreadsheet', 'api', 'import'] as const;
export type Origin = (typeof ORIGINS)[number];

export const ROW_KINDS = ['part', 'body', 'added'] as const;
export type RowKind = (typeof ROW_KINDS)[number];
