import { z } from 'zod';
import { codeField, showRef } from '../fields';
import { itemsOf, namesOneRow, noteField, rowRefFields, shaField } from './row-ref';

const item = z
  .strictObject({
    ...rowRefFields,
    value_sha256: shaField,
    /** The part's override in this shot in place of its own value. */
    shot: codeField.optional(),
  })
  .refine(namesOneRow.check, namesOneRow.error);

/** Approves the very values that were seen. `carry_over` approves only what moved less than the show's tolerance from its last approval. */
export const approveValuesInput = z.strictObject({ show: showRef, items: itemsOf(item), note: noteField.optional(), carry_over: z.boolean().default(false) });
export type ApproveValuesInput = z.infer<typeof approveValuesInput>;
export type ApproveItem = ApproveValuesInput['items'][number];
