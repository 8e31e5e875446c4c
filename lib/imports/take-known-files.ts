import type { Context } from '@/lib/context';
import type { TakeKnownFilesInput } from '@/lib/rules/inputs/take-known-files';
import type { KnownFilesAnswer } from '@/lib/rules/upload-parts';
import { findKnownContent } from './find-known-content';
import { getOpenImport } from './get-open-import';
import { registerFile } from './register-file';

/**
 * Puts those of the files into an open import whose content is in a show that the caller reads, without their bytes; says of which the
 * bytes are needed. All or nothing: a limit that one of them passes refuses the call.
 */
export async function takeKnownFiles(context: Context, input: TakeKnownFilesInput): Promise<KnownFilesAnswer> {
  const { known, row } = await getOpenImport(context, input);
  const there = await findKnownContent(context.db, known.actor, input.items);
  // By name, so that two calls with the same files in another order do not wait for each other.
  const inOrder = [...input.items].sort((a, b) => (a.name < b.name ? -1 : 1));
  await context.db.transaction(async (tx) => {
    for (const { bytes, sha256, ...said } of inOrder) if (there.has(sha256)) await registerFile(tx, row, said, { sha256, byteSize: bytes });
  });
  return { items: input.items.map(({ name, sha256 }) => ({ name, state: there.has(sha256) ? 'stored' : 'needed' })) };
}
