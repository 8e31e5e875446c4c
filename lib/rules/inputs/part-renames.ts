import { z } from 'zod';
import { codeField, showRef } from '../fields';
import { RENAME_DECISIONS } from '../part-rename';
import { itemsOf } from './row-ref';

/** Proposed renames of a show; of one asset, or of the assets that an import brought versions of. */
export const listPartRenamesInput = z.strictObject({ show: showRef, asset: codeField.optional(), import: z.uuid('import is the id of an import.').optional() });
export type ListPartRenamesInput = z.infer<typeof listPartRenamesInput>;

const partField = z.string().min(1, 'Name the part.').max(1000);

/** What a person makes of absent and arrived parts; `version` is the current one that they saw. */
export const decidePartRenamesInput = z.strictObject({
  show: showRef,
  items: itemsOf(
    z.strictObject({
      asset: codeField,
      version: z.string().min(1).max(64),
      part: partField,
      becomes: partField,
      decision: z.enum(RENAME_DECISIONS, `decision is one of ${RENAME_DECISIONS.join(', ')}.`),
      /** The sender saw that somebody kept the two apart, and confirms all the same; without it that is a conflict. */
      kept_apart: z.boolean('kept_apart is true or false.').optional(),
    }),
  ),
});
export type DecidePartRenamesInput = z.infer<typeof decidePartRenamesInput>;
