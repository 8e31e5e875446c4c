import type { LimitSums } from '../moments/limit-sums';
import { AREA_TOLERANCE, areaError } from '../patches/mend-surface';
import { currentKernel, PatchBlock } from './patch-block';
import { NET_VALUES, type PatchKind } from './patch-kinds';

/** How regular patches of a scheme are computed. */
export interface RegularRule {
  kind: PatchKind;
  /** Gauss nodes a direction that are exact for the ten solid moments. */
  nodes: number;
  /** Nodes whose area the finer one's is compared with. */
  coarseNodes: number;
  /** Mends the surface moments of a patch whose area the two rules do not agree on; returns the estimated error of the area. */
  mend(net: Float64Array, ox: number, oy: number, oz: number, surface: Float64Array, coarseArea: number): number;
}

const surface = new Float64Array(10);

/** Gathers regular patches, computes them block by block and adds their moments to the sums in the order in which they came. */
export class RegularPatches {
  private readonly block: PatchBlock;
  private readonly bodies: Int32Array;
  private readonly net: Float64Array;
  private count = 0;
  /** Where nets go: value i of a patch stands at `place(body) + 2 i`. */
  readonly input: Float64Array;

  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(private readonly rule: RegularRule, private readonly origins: Float64Array, private readonly sums: LimitSums) {
    this.block = new PatchBlock(currentKernel(rule.kind));
    this.bodies = new Int32Array(this.block.size);
    this.net = new Float64Array(NET_VALUES[rule.kind]);
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
    const { block, bodies, origins, sums, rule } = this;
    const { nodes, coarseNodes } = rule;
    block.run(this.count, nodes, coarseNodes);
    const { output } = block;
    for (let patch = 0; patch < this.count; patch++) {
      const body = bodies[patch];
      const at = block.resultAt(patch);
      const coarseArea = block.coarseArea(patch);
      let error = areaError(output[at + 20], coarseArea);
      sums.solid.magnitudes[body] += block.magnitude(patch);
      sums.solid.add(body, output, at, 2);
      if (error > AREA_TOLERANCE * output[at + 20]) {
        block.net(patch, this.net);
        for (let i = 0; i < 10; i++) surface[i] = output[at + 20 + 2 * i];
        error = rule.mend(this.net, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2], surface, coarseArea);
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
