import { z } from 'zod';
import { showRef } from '../fields';
import { announcedFile } from './announced-file';

/** Files of an import by their hashes: those that are there already need no bytes. */
export const takeKnownFilesInput = z.strictObject({
  show: showRef,
  import: z.string().min(1).max(64),
  items: z.array(z.strictObject(announcedFile)).min(1, 'Name at least one file.').max(1000, 'Name at most 1000 files at once.'),
});
export type TakeKnownFilesInput = z.infer<typeof takeKnownFilesInput>;
