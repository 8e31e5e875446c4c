import type { z } from 'zod';
import { StudioError } from '@/lib/rules/studio-error';

/** Where a page of a list ended, as text that fits into an address. */
export function writeCursor(place: readonly unknown[]): string {
  return Buffer.from(JSON.stringify(place)).toString('base64url');
}

/** The place that `writeCursor` wrote down. Errors: bad_input for text of any other shape. */
export function readCursor<Shape extends z.ZodType>(text: string, shape: Shape): z.infer<Shape> {
  const parsed = shape.safeParse(parseOrNull(Buffer.from(text, 'base64url').toString('utf8')));
  if (!parsed.success) throw foreignCursor();
  return parsed.data;
}

/** For a cursor that this list did not give out. */
export function foreignCursor(): StudioError {
  return new StudioError('bad_input', 'cursor: This is no cursor of this list.', { field: 'cursor' });
}

function parseOrNull(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
