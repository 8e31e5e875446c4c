import type { ItemError } from './studio-error';

/** What a server action answers a form: the verb's answer, or a refusal to show in place. */
export type ActionResult<Output> =
  | { ok: true; data: Output }
  | { ok: false; code: string; message: string; field: string | null; errors: ItemError[] };
