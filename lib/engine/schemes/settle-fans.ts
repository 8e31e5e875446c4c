import { isIsolated, type Fans, type RegularCounts } from './classify-vertices';
import type { FanBatches } from './fan-batches';
import type { LevelMesh } from './level-mesh';
import { EARLIER, OWN } from './refinement-blocks';

/** Finishes the isolated fans, those of them that are this block's by `batches`; tells how many of the `left` own faces are left. */
export function settleFans(mesh: LevelMesh, counts: RegularCounts, kinds: Uint8Array, fans: Fans, left: number, batches: FanBatches): number {
  for (let fan = 0; fan < fans.centre.length && left > 0; fan++) {
    if (!isIsolated(mesh, counts, kinds, fans, fan)) continue;
    let own = 0;
    let isEarliers = false;
    for (let i = fans.starts[fan]; i < fans.starts[fan + 1]; i++) {
      const face = mesh.faceOf[fans.corners[i]];
      if (mesh.live[face] === OWN) own++;
      else if (mesh.live[face] === EARLIER) isEarliers = true;
      mesh.live[face] = 0;
    }
    if (own > 0 && !isEarliers) batches.add(mesh, fans, fan);
    left -= own;
  }
  batches.flush();
  return left;
}
