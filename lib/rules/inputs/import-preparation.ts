import { z } from 'zod';
import { showRef } from '../fields';

/** What the preview has to know of a show before anything goes up. */
export const importPreparationInput = z.strictObject({ show: showRef });
export type ImportPreparationInput = z.infer<typeof importPreparationInput>;
