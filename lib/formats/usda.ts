import type { Cage } from '../engine/cage';
import type { Beside } from './beside';
import { composeUsd } from './compose-usd';
import { parseCrate } from './crate-layer';
import { kindOfBytes } from './detect-mesh-kind';
import { MeshError } from './mesh-error';
import { MOST_TEXT_BYTES } from './mesh-limits';
import { decodeText, detectTextStart } from './text-encoding';
import { readUsdMeshes } from './usd-meshes';
import type { UsdLayer } from './usd-prim';
import { parseUsda } from './usda-layer';

/**
 * Reads the meshes of a `.usda` layer, with those of layers beside it that it refers to, see `composeUsd` and `readUsdMeshes`.
 * Errors: MeshError with line and column, or the prim's path.
 */
export async function readUsda(bytes: Uint8Array, beside: Beside): Promise<Cage> {
  const layer = layerOf(bytes);
  await composeUsd(layer, (other) => (kindOfBytes(other) === 'usdc' ? parseCrate(other) : layerOf(other)), beside);
  return readUsdMeshes(layer);
}

function layerOf(bytes: Uint8Array): UsdLayer {
  if (bytes.length > MOST_TEXT_BYTES) throw new MeshError({ code: 'too_large', expected: `at most ${MOST_TEXT_BYTES} bytes of text`, detail: `expected at most ${MOST_TEXT_BYTES} bytes of text, found ${bytes.length}: save the layer as .usdc` });
  const { skip, wide } = detectTextStart(bytes);
  return parseUsda(wide ? new TextDecoder(wide).decode(bytes.subarray(skip)) : decodeText(bytes.subarray(skip)));
}
