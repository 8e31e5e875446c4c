import { z } from 'zod';
import { showRef } from '../fields';

/** A show's imports, newest first. */
export const listImportsInput = z.strictObject({
  show: showRef,
  limit: z.coerce.number().int().min(1).max(200).default(50),
  cursor: z.string().max(100).optional(),
});
export type ListImportsInput = z.infer<typeof listImportsInput>;
