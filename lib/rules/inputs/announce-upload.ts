import { z } from 'zod';
import { showRef } from '../fields';
import { DEFAULT_PART_BYTES, LARGEST_PART_BYTES, MOST_PARTS, SMALLEST_PART_BYTES } from '../upload-parts';
import { announcedFile } from './announced-file';

/** A file that will come in parts. Errors name the field. */
export const announceUploadInput = z
  .strictObject({
    show: showRef,
    import: z.string().min(1).max(64),
    ...announcedFile,
    part_bytes: z.number().int().min(SMALLEST_PART_BYTES, `part_bytes is at least ${SMALLEST_PART_BYTES}.`).max(LARGEST_PART_BYTES, `part_bytes is at most ${LARGEST_PART_BYTES}.`).default(DEFAULT_PART_BYTES),
  })
  .refine((input) => input.bytes > 0, { path: ['bytes'], message: 'An empty file has no parts. Put it at once.' })
  .refine((input) => Math.ceil(input.bytes / input.part_bytes) <= MOST_PARTS, { path: ['part_bytes'], message: `A file has at most ${MOST_PARTS} parts. Make them larger.` });
export type AnnounceUploadInput = z.infer<typeof announceUploadInput>;
