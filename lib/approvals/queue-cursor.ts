import { z } from 'zod';
import { foreignCursor, readCursor, writeCursor } from '@/lib/http/cursor-text';

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
  return writeCursor([state, assetAsked, asset, asked, part, shot]);
}

/** Throws bad_input for what this list did not give out, or gave out under another filter. */
export function decodeQueueCursor(text: string, state: string): QueueCursor {
  const [filter, assetAsked, asset, asked, part, shot] = readCursor(text, shape);
  if (filter !== state) throw foreignCursor();
  return { state, assetAsked, asset, asked, part, shot };
}
