import { z } from 'zod';
import { codeField, showRef } from '../fields';
import { itemsOf, namesOneRow, reasonField, rowRefFields } from './row-ref';

const copyField = z.string().trim().regex(/^[A-Za-z0-9._-]{0,32}$/, 'A copy is named by at most 32 letters, digits, dots, _ or -.').default('');

const item = z.strictObject({ ...rowRefFields, value_id: z.uuid('value_id is the id of an approved value.'), copy: copyField }).refine(namesOneRow.check, namesOneRow.error);

/** Locks approved values for a shot. */
export const lockValuesInput = z.strictObject({ show: showRef, shot: codeField, items: itemsOf(item) });
export type LockValuesInput = z.infer<typeof lockValuesInput>;

/** Ends locks of a shot; says why. */
export const unlockValuesInput = z.strictObject({ show: showRef, shot: codeField, items: itemsOf(z.strictObject({ lock: z.uuid('lock is the id of a lock.') })), reason: reasonField });
export type UnlockValuesInput = z.infer<typeof unlockValuesInput>;

/** Locks whatever is approved and not locked yet, in whole shots or sequences, or one asset wherever it is. */
export const lockShotsInput = z
  .strictObject({ show: showRef, shots: z.array(codeField).max(5000).default([]), sequence: codeField.optional(), asset: codeField.optional() })
  .refine((input) => input.shots.length > 0 || input.sequence !== undefined || input.asset !== undefined, { message: 'Name shots, a sequence or an asset.', path: ['shots'] });
export type LockShotsInput = z.infer<typeof lockShotsInput>;

/** Ends locks and locks the same parts to other approved values, in one act, in one shot or many. */
export const relockValuesInput = z.strictObject({
  show: showRef,
  items: itemsOf(z.strictObject({ lock: z.uuid('lock is the id of a lock.'), value_id: z.uuid('value_id is the id of an approved value.') })),
  reason: reasonField,
});
export type RelockValuesInput = z.infer<typeof relockValuesInput>;
