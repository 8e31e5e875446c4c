import { z } from 'zod';
import { QUEUE_FILTERS } from '../approval-queue';
import { showRef } from '../fields';

/** A page of a show's values that wait for an approval, or that have one. */
export const listQueueInput = z.strictObject({
  show: showRef,
  state: z.enum(QUEUE_FILTERS, `state is one of ${QUEUE_FILTERS.join(', ')}.`).default('waiting'),
  limit: z.coerce.number('limit is a number.').int('limit is a whole number.').min(1).max(1000, 'limit is at most 1000.').default(200),
  cursor: z.string().max(4000).optional(),
});
export type ListQueueInput = z.infer<typeof listQueueInput>;
