import type { LimitSums } from '../moments/limit-sums';
import type { Fans } from './classify-vertices';
import { FanBatch } from './fan-batch';
import type { FanKit } from './fan-kit';
import { makeFanState } from './fan-state';
import { fanKey } from './fan-tables';
import { integrateFan } from './integrate-fan';
import type { LevelMesh } from './level-mesh';

/** Fans on their way into the sums: those of one kind together; those with borders or of several bodies by themselves. */
export class FanBatches {
  private readonly batches = new Map<number, FanBatch>();

  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(private readonly kit: FanKit, private readonly origins: Float64Array, private readonly sums: LimitSums) {}

  /** Takes an isolated fan. */
  add(mesh: LevelMesh, fans: Fans, index: number): void {
    const { kit, origins, sums } = this;
    const corners = fans.corners.slice(fans.starts[index], fans.starts[index + 1]);
    const body = kit.body(mesh, corners[0]);
    if (!isWhole(kit, mesh, corners, body)) {
      sums.shells?.loneFan(mesh, fans, index);
      integrateFan(kit, mesh, fans, index, origins, sums);
      return;
    }
    const closed = fans.closed[index], sharpFirst = fans.sharpFirst[index], centre = fans.centre[index];
    const key = fanKey(corners.length, closed, sharpFirst, centre);
    let batch = this.batches.get(key);
    if (batch === undefined) {
      batch = new FanBatch(kit, makeFanState(corners.length, closed, sharpFirst, centre), sums);
      this.batches.set(key, batch);
    }
    kit.read(mesh, corners, batch.scratch);
    if (sums.shells?.fan(batch.scratch, kit.limit(batch.scratch), body) === false) sums.shells.loneFan(mesh, fans, index);
    batch.add(body, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]);
  }

  /** Computes and adds what is waiting. */
  flush(): void {
    for (const batch of this.batches.values()) batch.flush();
  }
}

/** Whether a fan is of one body and none of its sides is a border. */
function isWhole(kit: FanKit, mesh: LevelMesh, corners: readonly number[], body: number): boolean {
  for (const corner of corners) {
    if (kit.body(mesh, corner) !== body) return false;
    for (let side = 0; side < kit.sides; side++) if (mesh.borderOf[kit.sideAt(mesh, corner, side)] >= 0) return false;
  }
  return true;
}
