import type { LimitSums } from '../moments/limit-sums';
import { MOMENTS } from '../moments/sums';
import { mendSurface } from '../patches/mend-surface';
import { AREA_TOLERANCE, CHOICE_TOLERANCE, NODE_RANGES } from './node-choice';
import { currentKernel, PatchBlock } from './patch-block';
import { NET_VALUES, type PatchKind } from './patch-kinds';

const surface = new Float64Array(MOMENTS);

/** Gathers regular patches, computes them block by block and adds their moments to the sums in the order in which they came. */
export class RegularPatches {
  private readonly block: PatchBlock;
  private readonly bodies: Int32Array;
  private readonly net: Float64Array;
  private count = 0;
  /** Where nets go: value i of a patch stands at `place(body) + 2 i`. */
  readonly input: Float64Array;

  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(private readonly kind: PatchKind, private readonly origins: Float64Array, private readonly sums: LimitSums) {
    this.block = new PatchBlock(currentKernel(kind));
    this.bodies = new Int32Array(this.block.size);
    this.net = new Float64Array(NET_VALUES[kind]);
    this.input = this.block.input;
  }

  /** Makes room for a patch of a body and says where in `input` its net goes, which the caller fills at once. */
  place(body: number): number {
    const { block, origins } = this;
    if (this.count === block.size) this.flush();
    const patch = this.count++;
    this.bodies[patch] = body;
    block.putOrigin(patch, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]);
    return block.at(patch);
  }

  /** Adds a patch by its net. */
  add(body: number, values: Float64Array): void {
    const at = this.place(body);
    for (let i = 0; i < values.length; i++) this.input[at + 2 * i] = values[i];
  }

  /** Computes and adds what is waiting. */
  flush(): void {
    const { block, bodies, origins, sums, kind } = this;
    const { output } = block;
    const { closingError } = sums;
    block.choose(this.count, NODE_RANGES[kind].fewest, CHOICE_TOLERANCE, 0);
    for (let patch = 0; patch < this.count; patch++) {
      const body = bodies[patch];
      const at = block.resultAt(patch);
      const area = output[at + 20];
      let error = block.areaError(patch);
      sums.solid.magnitudes[body] += block.magnitude(patch);
      sums.solid.add(body, output, at, 2);
      const second = block.secondError(patch);
      if (second > 0) {
        const first = block.firstError(patch);
        for (let m = 1; m < MOMENTS; m++) closingError[MOMENTS * body + m] += m < 4 ? first : second;
      }
      if (error > AREA_TOLERANCE * area) {
        block.net(patch, this.net);
        for (let i = 0; i < MOMENTS; i++) surface[i] = output[at + 20 + 2 * i];
        error = mendSurface(kind, this.net, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2], surface, block.coarseArea(patch), error);
        sums.surface.add(body, surface, 0);
      } else sums.surface.add(body, output, at + 20, 2);
      sums.surfaceError[body] += error;
      if (sums.shells !== null) {
        block.net(patch, this.net);
        sums.shells.patch(body, this.net);
      }
    }
    this.count = 0;
  }
}
