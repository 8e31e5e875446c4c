import type { Cage } from '@/lib/engine/cage';
import { MeshError } from '@/lib/formats/mesh-error';
import { readObjStream } from '@/lib/formats/obj';

const READERS: Record<string, (chunks: AsyncIterable<Uint8Array>) => Promise<Cage>> = {
  obj: (chunks) => readObjStream(chunks),
};

/** Extensions of the files that can be read, without the dot. */
export const CAGE_EXTENSIONS = Object.keys(READERS);

/** Lower-case extension of a file name, without the dot; empty when it has none. */
export function extensionOf(name: string): string {
  return /\.([^./\\]+)$/.exec(name)?.[1].toLowerCase() ?? '';
}

/** Reads a cage by the extension of its file name. Errors: MeshError, `unknown_format` when no reader takes the extension. */
export async function readCage(name: string, chunks: AsyncIterable<Uint8Array>): Promise<Cage> {
  const extension = extensionOf(name);
  const reader = READERS[extension];
  if (reader) return reader(chunks);
  const found = extension === '' ? 'the name has no extension' : `".${extension}" is not one of them`;
  throw new MeshError({ code: 'unknown_format', detail: `files that can be read end in ${CAGE_EXTENSIONS.map((one) => `.${one}`).join(', ')}; ${found}` });
}
