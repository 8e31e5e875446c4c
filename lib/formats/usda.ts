import type { Cage } from '../engine/cage';
import { MeshError } from './mesh-error';
import { MOST_TEXT_BYTES } from './mesh-limits';
import { decodeText, detectTextStart } from './text-encoding';
import { readUsdMeshes } from './usd-meshes';
import { parseUsda } from './usda-layer';

/** Reads the meshes of a `.usda` layer, see `readUsdMeshes`. Errors: MeshError with line and column, or the prim's path. */
export function readUsda(bytes: Uint8Array): Cage {
  if (bytes.length > MOST_TEXT_BYTES) throw new MeshError({ code: 'too_large', expected: `at most ${MOST_TEXT_BYTES} bytes of text`, detail: `expected at most ${MOST_TEXT_BYTES} bytes of text, found ${bytes.length}: save the layer as .usdc` });
  const { skip, wide } = detectTextStart(bytes);
  return readUsdMeshes(parseUsda(wide ? new TextDecoder(wide).decode(bytes.subarray(skip)) : decodeText(bytes.subarray(skip))));
}
