import type { Cage } from '../engine/cage';
import { parseCrate } from './crate-layer';
import { readUsdMeshes } from './usd-meshes';

/** Reads the meshes of a `.usdc` layer, see `readUsdMeshes`. Errors: MeshError with the byte, or the prim's path. */
export function readUsdc(bytes: Uint8Array): Cage {
  return readUsdMeshes(parseCrate(bytes));
}
