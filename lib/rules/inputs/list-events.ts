import { z } from 'zod';
import { showRef } from '../fields';

const text = z.string().trim().max(200).default('');

/** What happened in a show, filtered by act, by the person's e-mail and by a part's or asset's name. */
export const listEventsInput = z.strictObject({
  show: showRef,
  act: text,
  person: text,
  part: text,
  before: z.coerce.number().int().positive().max(Number.MAX_SAFE_INTEGER).optional(),
});
export type ListEventsInput = z.infer<typeof listEventsInput>;
