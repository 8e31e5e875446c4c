import { SMOOTH_CENTRE, type Fans } from '../schemes/classify-vertices';
import { makeFanState, type FanState } from '../schemes/fan-state';
import type { LevelMesh } from '../schemes/level-mesh';
import { closesInBatch, FanBatchShell } from './fan-batch-shell';
import { addFanShell } from './fan-shell';
import { ShellBlock } from './shell-block';
import type { ShellKit } from './shell-kits';
import { emptyShells, type ShellBody } from './shell-sums';
import { SHELL_TERMS, TERM_SIGNS } from './shell-terms';

/** What a rule may err by on a regular patch, relatively. */
export const SHELL_TOLERANCE = 1e-9;

/** Takes the shell integrals of each patch and fan that an integration of a limit surface comes by. */
export class ShellVisitor {
  readonly shells: ShellBody[];
  /** Adds what sharp edges and corners hold, once all patches were seen. */
  finish: () => void = () => undefined;
  private readonly block: ShellBlock;
  private readonly bodies: Int32Array;
  private count = 0;
  private readonly fans: ShellBlock;
  /** Batches of smooth fans by valence; null where they fall too slowly for one. */
  private readonly batches: (FanBatchShell | null | undefined)[] = [];

  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(readonly kit: ShellKit, private readonly origins: Float64Array, bodies: number) {
    this.shells = emptyShells(bodies);
    this.block = new ShellBlock(kit, 'patches');
    this.fans = new ShellBlock(kit, 'fans');
    this.bodies = new Int32Array(this.block.size);
  }

  /** A regular patch by its net. */
  patch(body: number, net: Float64Array): void {
    const { origins, block } = this;
    block.put(this.count, net, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]);
    this.bodies[this.count++] = body;
    if (this.count === block.size) this.flushPatches();
  }

  private flushPatches(): void {
    const { block, bodies, shells, count } = this;
    if (count === 0) return;
    block.compute(count, SHELL_TOLERANCE);
    for (let patch = 0; patch < count; patch++) this.addPatch(patch, 1, shells[bodies[patch]]);
    this.count = 0;
  }

  /** Adds the terms of patch `patch` of the block, `weight` times, to `shell`. */
  private addPatch(patch: number, weight: number, shell: ShellBody): void {
    const { block } = this;
    const { output } = block.kernel;
    const at = block.resultAt(patch);
    for (let i = 0; i < SHELL_TERMS; i++) shell.terms[i] += weight * TERM_SIGNS[i] * output[at + 2 * i];
    for (let i = 0; i < 3; i++) shell.errors[i] += weight * block.errors[3 * patch + i];
    block.raise(patch, SHELL_TOLERANCE, shell.peak);
  }

  /** Adds the terms of so many patches of a body as there are weights, 2 SHELL_PAIRS at most, by those to `shell`; their nets follow each other. */
  weigh(body: number, nets: Float64Array, weights: Float64Array, shell: ShellBody): void {
    const { origins, block } = this;
    this.flushPatches();
    for (let patch = 0; patch < weights.length; patch++) {
      const net = nets.subarray(block.values * patch, block.values * (patch + 1));
      block.put(patch, net, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]);
    }
    block.compute(weights.length, SHELL_TOLERANCE);
    for (let patch = 0; patch < weights.length; patch++) this.addPatch(patch, weights[patch], shell);
  }

  /** An isolated fan of one body with its limit point. */
  fan(fan: FanState, limit: Float64Array, body: number): boolean {
    const { kit, fans, batches, origins, shells } = this;
    if (!fan.closed || fan.sharpFirst || fan.centreRule !== SMOOTH_CENTRE) return false;
    const n = fan.sectors;
    let batch = batches[n];
    if (batch === undefined) {
      batch = closesInBatch(kit, n) ? new FanBatchShell(kit, fans, makeFanState(n, true, false, SMOOTH_CENTRE), shells) : null;
      batches[n] = batch;
    }
    batch?.add(fan, limit, body, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]);
    return batch !== null;
  }

  /** An isolated fan that `fan` does not take, or of several bodies. */
  loneFan(mesh: LevelMesh, fans: Fans, index: number): void {
    addFanShell(this.kit, this.fans, mesh, fans, index, this.origins, this.shells);
  }

  /** Computes and adds what is waiting, and what sharp edges and corners hold. */
  close(): void {
    this.flushPatches();
    for (const batch of this.batches) batch?.flush();
    this.finish();
  }
}
