import { z } from 'zod';

/** What names a row of a show in the items of a bulk call. */
export const rowRefFields = {
  asset: z.string().min(1, 'Name the asset.').max(128),
  part: z.string().min(1).max(1000).optional(),
  body: z.string().min(1).max(1000).optional(),
};

export const namesOneRow = {
  check: (item: { part?: string; body?: string }) => (item.part === undefined) !== (item.body === undefined),
  error: { message: 'Name a part or a body.', path: ['part'] },
};

export const shaField = z.string().regex(/^[0-9a-f]{64}$/, 'value_sha256 is the hash of the value that was seen.');

export const noteField = z.string().trim().max(2000, 'A note has at most 2,000 characters.');

export const reasonField = z.string('Say why.').trim().min(1, 'Say why.').max(500, 'A reason has at most 500 characters.');

/** Items of one bulk call. */
export const MAX_ITEMS = 20_000;

export function itemsOf<Item extends z.ZodType>(item: Item) {
  return z.array(item).min(1, 'Send at least one item.').max(MAX_ITEMS, `Send at most ${MAX_ITEMS} items at once.`);
}
