import { z } from 'zod';
import { showRef } from '../fields';
import { CATEGORIES, ROW_KINDS, VALUE_STATES, type Category, type ValueState } from '../states';

/** Columns that a list may be ordered by; a leading minus turns the order round. */
export const PART_SORTS = [
  'asset',
  'part',
  'category',
  'version',
  'state',
  'construction',
  'material',
  'mass_kg',
  'density_kg_m3',
  'volume_m3',
  'area_m2',
  'com_x_m',
  'com_y_m',
  'com_z_m',
  'i1_kg_m2',
  'i2_kg_m2',
  'i3_kg_m2',
  'faces',
  'set_at',
] as const;
export type PartSort = (typeof PART_SORTS)[number];

/** One word, or several with commas between. */
function words<Word extends string>(name: string, allowed: readonly Word[]) {
  return z
    .string()
    .transform((text) => text.split(','))
    .pipe(z.array(z.enum(allowed as readonly [Word, ...Word[]], `${name} is one of ${allowed.join(', ')}, or several with commas.`)));
}

export const stateFilter = words<ValueState>('state', VALUE_STATES);
export const categoryFilter = words<Category>('category', CATEGORIES);

const sorts = PART_SORTS.flatMap((sort) => [sort, `-${sort}`] as const);

/** A show's parts as they are now. `problem` is a finding's code, or `any`; `changed_since` a show revision that an earlier answer gave. */
export const listPartsInput = z.strictObject({
  show: showRef,
  row: z.enum(ROW_KINDS, `row is one of ${ROW_KINDS.join(', ')}.`).optional(),
  asset: z.string().min(1).max(128).optional(),
  category: categoryFilter.optional(),
  state: stateFilter.optional(),
  problem: z
    .string()
    .regex(/^[a-z][a-z0-9_]{0,63}$/, 'problem is the code of a finding, or any.')
    .optional(),
  q: z.string().trim().max(200, 'q has at most 200 characters.').optional(),
  sort: z.enum(sorts, `sort is one of ${PART_SORTS.join(', ')}, with a minus before it for the other way round.`).default('asset'),
  limit: z.coerce.number('limit is a number.').int('limit is a whole number.').min(1).max(1000, 'limit is at most 1000.').default(100),
  cursor: z.string().max(2000).optional(),
  changed_since: z.coerce.number('changed_since is a revision of the show.').int('changed_since is a revision of the show.').min(0).optional(),
});
export type ListPartsInput = z.infer<typeof listPartsInput>;
