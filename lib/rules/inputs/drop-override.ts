import { z } from 'zod';
import { codeField, showRef } from '../fields';
import { reasonField } from './row-ref';

/** Ends the override of a part in a shot. */
export const dropOverrideInput = z.strictObject({ show: showRef, shot: codeField, asset: z.string().min(1).max(128), part: z.string().min(1).max(1000), reason: reasonField });
export type DropOverrideInput = z.infer<typeof dropOverrideInput>;
