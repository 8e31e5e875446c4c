import { z } from 'zod';
import { showRef } from '../fields';

/** A show by its code. */
export const showRefInput = z.strictObject({ show: showRef });
export type ShowRefInput = z.infer<typeof showRefInput>;
