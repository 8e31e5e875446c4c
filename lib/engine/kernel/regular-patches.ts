import type { LimitSums } from '../moments/limit-sums';
import { MOMENTS } from '../moments/sums';
import { AREA_TOLERANCE, areaError, COARSE_NODES, mendSurfaceMoments } from '../patches/bicubic-surface';
import { PatchBlock } from './patch-block';

/** Exact for the ten solid moments of a bicubic patch: degree 13 a direction. */
const EXACT_NODES = 7;

const net = new Float64Array(48);
const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);

/** Gathers regular patches, computes them block by block and adds their moments to the sums in the order in which they came. */
export class RegularPatches {
  private readonly block = new PatchBlock();
  private readonly bodies = new Int32Array(this.block.size);
  private count = 0;

  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(private readonly origins: Float64Array, private readonly sums: LimitSums) {}

  add(body: number, values: Float64Array): void {
    const { origins } = this;
    this.block.put(this.count, values, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]);
    this.bodies[this.count++] = body;
    if (this.count === this.block.size) this.flush();
  }

  /** Computes and adds what is waiting. */
  flush(): void {
    const { block, origins, sums } = this;
    block.run(this.count, EXACT_NODES, COARSE_NODES);
    for (let patch = 0; patch < this.count; patch++) {
      const body = this.bodies[patch];
      sums.solid.magnitudes[body] += block.read(patch, solid, surface);
      let error = areaError(surface, block.coarseArea(patch));
      if (error > AREA_TOLERANCE * surface[0]) {
        block.net(patch, net);
        error = mendSurfaceMoments(net, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2], surface, block.coarseArea(patch));
      }
      sums.surfaceError[body] += error;
      sums.solid.add(body, solid, 0);
      sums.surface.add(body, surface, 0);
    }
    this.count = 0;
  }
}
