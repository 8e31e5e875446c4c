import { z } from 'zod';
import { StudioError } from '@/lib/rules/studio-error';

/** Where a page of the queue ended: the filter it belongs to and the last value's place in its order. */
export interface QueueCursor {
  state: string;
  /** Something of the asset is asked for. */
  assetAsked: boolean;
  asset: string;
  asked: boolean;
  part: string;
  shot: string;
}

const shape = z.tuple([z.string(), z.boolean(), z.string(), z.boolean(), z.string(), z.string()]);

export function encodeQueueCursor({ state, assetAsked, asset, asked, part, shot }: QueueCursor): string {
  return Buffer.from(JSON.stringify([state, assetAsked, asset, asked, part, shot])).toString('base64url');
}

/** Throws bad_input for what this list did not give out, or gave out under another filter. */
export function decodeQueueCursor(text: string, state: string): QueueCursor {
  const parsed = shape.safeParse(parseJson(Buffer.from(text, 'base64url').toString('utf8')));
  if (!parsed.success || parsed.data[0] !== state) throw new StudioError('bad_input', 'cursor: This is no cursor of this list.', { field: 'cursor' });
  const [, assetAsked, asset, asked, part, shot] = parsed.data;
  return { state, assetAsked, asset, asked, part, shot };
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
