import { z } from 'zod';
import { codeField, showRef } from '../fields';

/** The inputs behind a show's current values, or behind what is locked for a shot; of one asset where it is named. */
export const listValueInputsInput = z.strictObject({ show: showRef, shot: codeField.optional(), asset: codeField.optional() });
export type ListValueInputsInput = z.infer<typeof listValueInputsInput>;
