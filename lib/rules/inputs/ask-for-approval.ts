import { z } from 'zod';
import { showRef } from '../fields';
import { itemsOf, namesOneRow, noteField, rowRefFields, shaField } from './row-ref';

const item = z.strictObject({ ...rowRefFields, value_sha256: shaField }).refine(namesOneRow.check, namesOneRow.error);

/** Asks the leads to approve these values; `take_back` closes questions of one's own. */
export const askForApprovalInput = z.strictObject({ show: showRef, items: itemsOf(item), note: noteField.optional(), take_back: z.boolean().default(false) });
export type AskForApprovalInput = z.infer<typeof askForApprovalInput>;
