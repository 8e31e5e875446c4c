import { disk, PARTS } from './disk';

/** Removes every stored part of an upload. */
export async function dropParts(uploadId: string): Promise<void> {
  await (await disk()).deleteAll(`${PARTS}/${uploadId}`);
}
