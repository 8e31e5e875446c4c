import { z } from 'zod';
import { showRef } from '../fields';
import { versionLabel } from './part-ref';

/**
 * Two values of a part, or of all parts of an asset together. `a` (before) and `b` (after) are a version's label, `approved` (the
 * last standing approval) or `current`; a lock stands in place of asset, part and `a`.
 */
export const getComparisonInput = z
  .strictObject({
    show: showRef,
    asset: z.string().min(1).max(128).optional(),
    part: z.string().min(1).max(1000).optional(),
    a: versionLabel.optional(),
    b: versionLabel.optional(),
    lock: z.uuid('lock is the id of a lock.').optional(),
  })
  .refine((input) => input.asset !== undefined || input.lock !== undefined, { message: 'Name an asset or a lock.', path: ['asset'] });
export type GetComparisonInput = z.infer<typeof getComparisonInput>;
