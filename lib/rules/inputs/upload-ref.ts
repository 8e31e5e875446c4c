import { z } from 'zod';
import { showRef } from '../fields';
import { saidOfFile } from './announced-file';

const ref = { show: showRef, import: z.string().min(1).max(64), upload: z.string().min(1).max(64) };

/** One upload that goes on. */
export const uploadRefInput = z.strictObject(ref);
export type UploadRefInput = z.infer<typeof uploadRefInput>;

/** One part of it, counted from 1; its bytes are the request's body. */
export const putUploadPartInput = z.strictObject({ ...ref, part: z.coerce.number('A part’s number is a whole number.').int('A part’s number is a whole number.').min(1, 'Parts count from 1.') });
export type PutUploadPartInput = z.infer<typeof putUploadPartInput>;

/** The end of it: under which name the content comes into the import. */
export const completeUploadInput = z.strictObject({ ...ref, ...saidOfFile });
export type CompleteUploadInput = z.infer<typeof completeUploadInput>;
