import { z } from 'zod';
import { showRef } from '../fields';

const text = z.string().trim().max(200).default('');
const day = z.union([z.literal(''), z.iso.date('Give a day as 2026-03-01.')]).default('');

/** Which acts of a show's history: by act, by the person's e-mail, by what they are about, and from one day (UTC) through another. */
const filters = {
  show: showRef,
  act: text,
  person: text,
  /** A piece of a part's name or of `asset/part`; with `asset` exactly the name of one of its parts. */
  part: z.string().trim().max(1000).default(''),
  /** Exactly this asset. */
  asset: text,
  /** Exactly this shot. */
  shot: text,
  from: day,
  to: day,
};

/** What happened in a show, the newest first. */
export const listEventsInput = z.strictObject({ ...filters, before: z.coerce.number().int().positive().max(Number.MAX_SAFE_INTEGER).optional() });
export type ListEventsInput = z.infer<typeof listEventsInput>;

/** The same as a CSV file. `guard=1` puts an apostrophe before text that a spreadsheet would run; for people, never for scripts. */
export const exportEventsInput = z.strictObject({ ...filters, guard: z.enum(['0', '1'], 'guard is 0 or 1.').default('0') });
export type ExportEventsInput = z.infer<typeof exportEventsInput>;
