import { z } from 'zod';
import { showRef } from '../fields';

/** One import of a show. Whatever stands there, it either exists for the caller or it does not. */
export const importRefInput = z.strictObject({ show: showRef, import: z.string().min(1).max(64) });
export type ImportRefInput = z.infer<typeof importRefInput>;
