import { z } from 'zod';
import { showRef } from '../fields';
import { itemsOf, reasonField } from './row-ref';

/** Takes approvals back, by their value_id. */
export const withdrawApprovalsInput = z.strictObject({ show: showRef, items: itemsOf(z.strictObject({ value_id: z.uuid('value_id is the id of an approved value.') })), reason: reasonField });
export type WithdrawApprovalsInput = z.infer<typeof withdrawApprovalsInput>;
