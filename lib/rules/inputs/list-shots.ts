import { z } from 'zod';
import { codeField, showRef } from '../fields';

export const SHOT_FILTERS = ['complete', 'missing', 'outdated'] as const;
export type ShotFilter = (typeof SHOT_FILTERS)[number];

/** A show's shots by sequence and code, with how far each is. */
export const listShotsInput = z.strictObject({
  show: showRef,
  sequence: codeField.optional(),
  asset: codeField.optional(),
  state: z.enum(SHOT_FILTERS, `state is one of ${SHOT_FILTERS.join(', ')}.`).optional(),
  q: z.string().trim().max(200, 'q has at most 200 characters.').optional(),
  limit: z.coerce.number('limit is a number.').int('limit is a whole number.').min(1).max(1000, 'limit is at most 1000.').default(100),
  cursor: z.string().max(500).optional(),
});
export type ListShotsInput = z.infer<typeof listShotsInput>;
