import type { Beside } from './beside';
import { checkGltf } from './check-gltf';
import { parseGltf, type GltfDocument } from './gltf-document';
import { MeshError } from './mesh-error';
import { MOST_TEXT_BYTES } from './mesh-limits';
import { decodeText, detectTextStart } from './text-encoding';

const MAGIC = 0x46546c67;
const JSON_CHUNK = 0x4e4f534a;
const BINARY_CHUNK = 0x004e4942;
const HEADER_BYTES = 12;
const CHUNK_HEADER_BYTES = 8;

interface Chunks {
  json: Uint8Array;
  binary: Uint8Array | null;
}

/** Whether the bytes begin as the binary form does. */
export function isGlb(bytes: Uint8Array): boolean {
  return bytes.length >= 4 && new DataView(bytes.buffer, bytes.byteOffset).getUint32(0, true) === MAGIC;
}

/** The document of a GLB or glTF file with the bytes of its buffers, checked. Errors: MeshError, with the byte in a GLB's frame, else with the JSON's path. */
export async function openGltf(bytes: Uint8Array, beside: Beside): Promise<{ document: GltfDocument; buffers: Uint8Array[] }> {
  const { json, binary } = isGlb(bytes) ? splitGlb(bytes) : { json: bytes.subarray(detectTextStart(bytes).skip), binary: null };
  if (json.length > MOST_TEXT_BYTES) throw new MeshError({ code: 'too_large', expected: `at most ${MOST_TEXT_BYTES} bytes of JSON`, detail: `expected at most ${MOST_TEXT_BYTES} bytes of JSON, found ${json.length}: save it as .glb` });
  const document = parseGltf(decodeText(json));
  const buffers: Uint8Array[] = [];
  for (const [i, buffer] of (document.buffers ?? []).entries()) buffers.push(await bufferBytes(buffer.uri, i, binary, beside));
  checkGltf(document, buffers.map((buffer) => buffer.length));
  return { document, buffers };
}

function splitGlb(bytes: Uint8Array): Chunks {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const need = (end: number, what: string, offset: number) => {
    if (end > bytes.length) throw new MeshError({ code: 'truncated', expected: what, detail: `expected ${what}, found the end of the file`, offset });
  };
  need(HEADER_BYTES + CHUNK_HEADER_BYTES, 'a header and a first chunk', 0);
  const version = view.getUint32(4, true);
  if (version !== 2) throw new MeshError({ code: 'bad_gltf', expected: 'glTF 2', found: String(version), detail: `expected glTF 2, found version ${version}`, offset: 4 });
  const declared = view.getUint32(8, true);
  if (declared > bytes.length) throw new MeshError({ code: 'truncated', expected: `${declared} bytes`, found: String(bytes.length), detail: `expected the ${declared} bytes that the header declares, found ${bytes.length}`, offset: 8 });
  let json: Uint8Array | null = null;
  let binary: Uint8Array | null = null;
  for (let at = HEADER_BYTES; at + CHUNK_HEADER_BYTES <= declared; ) {
    const length = view.getUint32(at, true);
    const type = view.getUint32(at + 4, true);
    const start = at + CHUNK_HEADER_BYTES;
    need(start + length, `a chunk of ${length} bytes`, at);
    if (json === null && type !== JSON_CHUNK) throw new MeshError({ code: 'bad_gltf', expected: 'the JSON chunk', detail: 'expected the JSON chunk first', offset: at + 4 });
    if (json === null) json = bytes.subarray(start, start + length);
    else if (type === BINARY_CHUNK && binary === null) binary = bytes.subarray(start, start + length);
    at = start + length + ((4 - (length % 4)) % 4);
  }
  if (json === null) throw new MeshError({ code: 'bad_gltf', expected: 'the JSON chunk', detail: 'expected a JSON chunk, found none', offset: HEADER_BYTES });
  return { json, binary };
}

async function bufferBytes(uri: string | undefined, i: number, binary: Uint8Array | null, beside: Beside): Promise<Uint8Array> {
  if (uri === undefined) {
    if (i === 0 && binary) return binary;
    throw new MeshError({ code: 'missing_buffer', expected: 'the bytes of the buffer', detail: `glTF buffers.${i}: expected the bytes of the buffer in the file, found none` });
  }
  if (uri.startsWith('data:')) {
    const comma = uri.indexOf(',');
    if (comma < 0 || !/;base64$/i.test(uri.slice(0, comma))) throw new MeshError({ code: 'missing_buffer', expected: 'base64', detail: `glTF buffers.${i}.uri: expected the data in base64` });
    return new Uint8Array(Buffer.from(uri.slice(comma + 1), 'base64'));
  }
  const shown = uri.length > 80 ? `${uri.slice(0, 80)}…` : uri;
  const found = /^[a-z][a-z0-9+.-]*:/i.test(uri) || uri.startsWith('/') ? null : await beside(decodeUri(uri));
  if (found) return found;
  throw new MeshError({ code: 'missing_buffer', expected: 'the buffer in the file or beside it', found: shown, detail: `glTF buffers.${i}: expected the buffer inside the file or beside it in a ZIP, found a pointer to "${shown}"` });
}

function decodeUri(uri: string): string {
  try {
    return decodeURIComponent(uri);
  } catch {
    return uri;
  }
}
