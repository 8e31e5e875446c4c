import { z } from 'zod';
import { MAX_VERSION } from '../import-plan';
import { fileNameField, putImportFileInput, versionField } from './put-import-file';

export const sha256Field = z
  .string('sha256 is 64 hexadecimal digits.')
  .trim()
  .toLowerCase()
  .regex(/^[0-9a-f]{64}$/, 'sha256 is 64 hexadecimal digits.');

const { asset, outside_id, category } = putImportFileInput.shape;

/** What is said of a file in JSON: where it goes, as beside a single PUT. */
export const saidOfFile = {
  name: fileNameField,
  asset,
  version: z.union([versionField, z.number().int().min(0).max(MAX_VERSION)]).optional(),
  outside_id,
  category,
};

/** A file whose bytes are to come, or are there already. */
export const announcedFile = {
  ...saidOfFile,
  bytes: z.number('bytes is the size of the file.').int('bytes is a whole number.').min(0, 'bytes is not negative.'),
  sha256: sha256Field,
};
