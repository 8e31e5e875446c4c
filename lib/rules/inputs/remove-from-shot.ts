import { z } from 'zod';
import { codeField, showRef } from '../fields';

/** Takes an asset out of a shot: all its copies, or the last so many. */
export const removeFromShotInput = z.strictObject({
  show: showRef,
  shot: codeField,
  asset: codeField,
  copies: z.coerce.number('copies is a number.').int('copies is a whole number.').min(1).max(200).optional(),
});
export type RemoveFromShotInput = z.infer<typeof removeFromShotInput>;
