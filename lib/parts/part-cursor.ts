import { z } from 'zod';
import { readCursor, writeCursor } from '@/lib/http/cursor-text';
import { StudioError } from '@/lib/rules/studio-error';

/** Where a page ended: the sort it belongs to, the sorted value there, and the row's asset and part. */
export interface PartCursor {
  sort: string;
  value: string | number | null;
  asset: string;
  part: string;
}

const shape = z.tuple([z.string(), z.union([z.string(), z.number(), z.null()]), z.string(), z.string()]);

export function encodeCursor({ sort, value, asset, part }: PartCursor): string {
  return writeCursor([sort, value, asset, part]);
}

/** Throws bad_input for what this list did not give out, or gave out under another sort. */
export function decodeCursor(text: string, sort: string): PartCursor {
  const [sortedBy, value, asset, part] = readCursor(text, shape);
  if (sortedBy !== sort) throw new StudioError('bad_input', 'cursor: This cursor belongs to a list in another order.', { field: 'cursor' });
  return { sort, value, asset, part };
}
