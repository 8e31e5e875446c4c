import { z } from 'zod';
import { showRef } from '../fields';
import { MAX_VERSION } from '../import-plan';
import { splitPath } from '../name-pattern';
import { MAX_ASSET_CODE } from '../place-names';
import { CATEGORIES } from '../states';

const MAX_NAME = 1024;

/** A path of the import as one text with forward slashes. */
export const fileNameField = z
  .union([z.string(), z.array(z.string())])
  .transform((value) => (Array.isArray(value) ? value.join('/') : value))
  .transform((value) => value.normalize('NFC'))
  .refine((value) => !/[\u0000-\u001f\u007f]/.test(value), 'A file name has no control characters.')
  .transform((value) => {
    const { folders, file } = splitPath(value);
    return [...folders, file].join('/');
  })
  .refine((value) => value.length >= 1 && value.length <= MAX_NAME, `A file name has 1 to ${MAX_NAME} characters.`);

export const assetCodeField = z
  .string()
  .trim()
  .min(1, 'Give a code for the asset.')
  .max(MAX_ASSET_CODE, `An asset’s code has at most ${MAX_ASSET_CODE} characters.`)
  .regex(/^[^/\\\u0000-\u001f\u007f]+$/, 'An asset’s code has no slashes and no control characters.');

/** `12`, `012` or `v012`. */
export const versionField = z
  .string()
  .regex(/^v?\d{1,9}$/i, 'A version is a whole number, such as 12 or v012.')
  .transform((value) => Number(value.replace(/^v/i, '')))
  .refine((value) => value <= MAX_VERSION, `A version is at most ${MAX_VERSION}.`);

/** One file of an open import; its bytes are the request's body. What is given here wins over the name pattern. */
export const putImportFileInput = z.strictObject({
  show: showRef,
  import: z.string().min(1).max(64),
  name: fileNameField,
  asset: assetCodeField.optional(),
  version: versionField.optional(),
  outside_id: z.string().trim().min(1).max(200).optional(),
  category: z.enum(CATEGORIES, `category is one of ${CATEGORIES.join(', ')}.`).optional(),
});
export type PutImportFileInput = z.infer<typeof putImportFileInput>;
