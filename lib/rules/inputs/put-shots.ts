import { z } from 'zod';
import { showRef } from '../fields';
import { MAX_ITEMS } from './row-ref';

export const shotCodeField = z.string('Give the code of the shot.').trim().regex(/^[A-Za-z0-9][A-Za-z0-9._-]{0,63}$/, 'A code starts with a letter or digit and has at most 64 letters, digits, dots, _ or -.');

const assetInShot = z.union([
  z.string().trim().min(1, 'Name the asset.').max(128),
  z.strictObject({ asset: z.string().trim().min(1, 'Name the asset.').max(128), copies: z.number().int('copies is a whole number.').min(1).max(200, 'A shot has at most 200 copies of one asset.').default(1) }),
]);

/** Shots and the assets in them; an asset may stand with its number of copies. A shot that exists gets what it does not have yet. */
export const putShotsInput = z.strictObject({
  show: showRef,
  items: z
    .array(
      z.strictObject({
        code: shotCodeField,
        sequence: shotCodeField,
        title: z.string().trim().max(200, 'A title has at most 200 characters.').optional(),
        assets: z.array(assetInShot).max(2000, 'A shot has at most 2,000 assets.').default([]),
      }),
    )
    .min(1, 'Send at least one item.')
    .max(MAX_ITEMS, `Send at most ${MAX_ITEMS} items at once.`),
});
export type PutShotsInput = z.infer<typeof putShotsInput>;
