import type { Cage } from '../engine/cage';
import { NOTHING_BESIDE, type Beside } from './beside';
import { detectMeshKind, MAGIC_BYTES } from './detect-mesh-kind';
import { joinBytes } from './join-bytes';
import { MeshError } from './mesh-error';
import { MOST_FILE_BYTES } from './mesh-limits';
import { readObjStream } from './obj';
import { readMeshBytes, withJointsBeside } from './read-mesh-bytes';

/**
 * Reads one mesh file of any format as a cage in the file's own unit and frame, with the parts, tags, unit, up axis and warnings that it carries.
 * Several meshes in a file are one cage, told apart by their objects. An OBJ is read as it streams, every other format is held whole, up to a gigabyte.
 * Errors: MeshError (the file's fault), and whatever the stream throws.
 */
export async function readMesh(name: string, chunks: AsyncIterable<Uint8Array>, beside: Beside = NOTHING_BESIDE): Promise<Cage> {
  const iterator = chunks[Symbol.asyncIterator]();
  const head: Uint8Array[] = [];
  let held = 0;
  while (held < MAGIC_BYTES) {
    const next = await iterator.next();
    if (next.done) break;
    head.push(next.value);
    held += next.value.length;
  }
  const whole = resume(head, iterator);
  try {
    const kind = detectMeshKind(name, joinBytes(head));
    if (kind === 'obj') return await withJointsBeside(await readObjStream(whole), name, beside);
    const bytes = await collect(whole);
    if (kind === 'archive') return await (await import('./mesh-archive')).readMeshArchive(bytes, name);
    return await readMeshBytes(name, bytes, beside);
  } catch (error) {
    throw readable(error);
  } finally {
    await iterator.return?.();
  }
}

/** The chunks taken to look at the file's beginning, and those that follow. */
async function* resume(head: Uint8Array[], rest: AsyncIterator<Uint8Array>): AsyncGenerator<Uint8Array> {
  yield* head;
  for (let next = await rest.next(); !next.done; next = await rest.next()) yield next.value;
}

async function collect(chunks: AsyncIterable<Uint8Array>): Promise<Uint8Array> {
  const pieces: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of chunks) {
    length += chunk.length;
    if (length > MOST_FILE_BYTES) throw new MeshError({ code: 'too_large', expected: `at most ${MOST_FILE_BYTES} bytes`, detail: `expected at most ${MOST_FILE_BYTES} bytes, found more; only OBJ files may be larger`, offset: MOST_FILE_BYTES });
    pieces.push(chunk);
  }
  return joinBytes(pieces);
}

/** A size that the machine has no room for is the file's fault as well. */
function readable(error: unknown): unknown {
  if (!(error instanceof RangeError) || !/allocation|array length|array buffer/i.test(error.message)) return error;
  return new MeshError({ code: 'too_large', detail: 'the file asks for more memory than there is' });
}
