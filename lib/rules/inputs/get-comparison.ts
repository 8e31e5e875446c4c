import { z } from 'zod';
import { codeField, showRef } from '../fields';
import { versionLabel } from './part-ref';

/**
 * Two values of a part, or of all parts of an asset together. `a` (before) and `b` (after) are a version's label, `approved` (the
 * last standing approval) or `current`; a lock stands in place of asset, part and `a`, and a shot's override in place of `b`.
 */
export const getComparisonInput = z
  .strictObject({
    show: showRef,
    asset: z.string().min(1).max(128).optional(),
    part: z.string().min(1).max(1000).optional(),
    a: versionLabel.optional(),
    b: versionLabel.optional(),
    shot: codeField.optional(),
    lock: z.uuid('lock is the id of a lock.').optional(),
  })
  .refine((input) => input.shot === undefined || (input.part !== undefined && input.lock === undefined), { message: 'An override belongs to a part.', path: ['shot'] })
  .refine((input) => input.asset !== undefined || input.lock !== undefined, { message: 'Name an asset or a lock.', path: ['asset'] });
export type GetComparisonInput = z.infer<typeof getComparisonInput>;
