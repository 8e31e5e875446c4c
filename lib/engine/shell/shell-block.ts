import { inputStride, NET_VALUES } from '../kernel/patch-kinds';
import type { ShellErrors } from './bicubic-shell';
import { BENDS_STRIDE, POWERS_STRIDE, SHELL_PAIRS, TOTALS_STRIDE, type ShellKernel } from './shell-kernel';
import type { ShellKit } from './shell-kits';
import { seriesRate, type SeriesRate } from './series-rate';
import { addRuleErrors, bendVariation, chooseNodes } from './shell-nodes';
import { SHELL_TERMS, TERM_SIGNS, type CurvaturePeak } from './shell-terms';
import { shellKernel } from './shell-vector';

const INWARD_AT = 2 * SHELL_TERMS;
const CURVED_AT = INWARD_AT + 2;

/** Patches whose shell terms are computed together, two a vector. A pair takes as many nodes as the one of both that bends more; what bends too much for any rule is quartered. */
export class ShellBlock {
  readonly size = 2 * SHELL_PAIRS;
  readonly values: number;
  readonly kernel: ShellKernel;
  /** What the rules of the patches computed last may err by, three each as ShellErrors has them. */
  readonly errors = new Float64Array(6 * SHELL_PAIRS);
  private readonly quartered: ShellErrors = [0, 0, 0];
  private readonly stride: number;
  private readonly areaShare: number;
  private readonly nodes = new Int32Array(2 * SHELL_PAIRS);
  private readonly rates: SeriesRate[] = Array.from({ length: 2 * SHELL_PAIRS }, () => ({ rate: 0, bend: 0 }));
  private readonly areas = new Float64Array(2 * SHELL_PAIRS);
  private readonly net: Float64Array;
  private readonly powers: Float64Array;
  private readonly terms = new Float64Array(SHELL_TERMS);
  private readonly unused: ShellErrors = [0, 0, 0];
  private readonly found: CurvaturePeak = { curvature: 0, x: 0, y: 0, z: 0 };
  /** Peaks of the patches that were quartered, by patch. */
  private readonly peaks = new Map<number, CurvaturePeak>();

  /** Blocks of one `use` overwrite each other. */
  constructor(private readonly kit: ShellKit, use: 'patches' | 'fans') {
    const { kind } = kit.fan.rule;
    this.kernel = shellKernel(kind, use);
    this.values = NET_VALUES[kind];
    this.stride = inputStride(kind);
    this.areaShare = kind === 'triangle' ? 1 / 2 : 1;
    this.net = new Float64Array(this.values);
    this.powers = new Float64Array(kit.coefficients);
  }

  /** Puts a patch's net and the point that its moments shall be about. */
  put(patch: number, net: Float64Array, ox: number, oy: number, oz: number): void {
    const { values } = this;
    const { input } = this.kernel;
    const at = this.at(patch);
    for (let i = 0; i < values; i++) input[at + 2 * i] = net[i];
    input[at + 2 * values] = ox;
    input[at + 2 * values + 2] = oy;
    input[at + 2 * values + 4] = oz;
  }

  private at(patch: number): number {
    return (patch >> 1) * this.stride + (patch & 1);
  }

  /** Computes the first `patches`, each to about `tolerance`, relatively. */
  compute(patches: number, tolerance: number): void {
    const { kernel, nodes } = this;
    const pairs = (patches + 1) >> 1;
    kernel.bend(pairs);
    this.peaks.clear();
    for (let patch = 0; patch < patches; patch++) this.choose(patch, tolerance);
    for (let pair = 0; pair < pairs; pair++) kernel.counts[pair] = 2 * pair + 1 < patches ? Math.max(nodes[2 * pair], nodes[2 * pair + 1]) : nodes[2 * pair];
    kernel.terms(pairs);
    for (let patch = 0; patch < patches; patch++) {
      if (nodes[patch] === 0) this.quarter(patch, tolerance);
      else this.addError(patch);
    }
  }

  private choose(patch: number, tolerance: number): void {
    const { bends, kind, powers } = this.kernel;
    const at = (patch >> 1) * BENDS_STRIDE + (patch & 1);
    const found = this.rates[patch];
    seriesRate(kind, powers, (patch >> 1) * POWERS_STRIDE + (patch & 1), 2, found);
    this.areas[patch] = Math.sqrt(bends[at]) * this.areaShare;
    found.rate = Math.max(found.rate, bendVariation(bends, at, kind === 'triangle'));
    this.nodes[patch] = chooseNodes(found.rate, tolerance);
  }

  private addError(patch: number): void {
    const { errors, kernel } = this;
    const nodes = kernel.counts[patch >> 1];
    const curvature = kernel.output[this.resultAt(patch) + CURVED_AT] / 2;
    errors.fill(0, 3 * patch, 3 * patch + 3);
    addRuleErrors(errors, 3 * patch, nodes, this.rates[patch], this.areas[patch], curvature, kernel.kind === 'triangle');
  }

  private quarter(patch: number, tolerance: number): void {
    const { terms, kit, kernel } = this;
    const peak: CurvaturePeak = { curvature: 0, x: 0, y: 0, z: 0 };
    const { output } = kernel;
    this.fillPowers(patch);
    terms.fill(0);
    this.quartered.fill(0);
    kit.add(this.powers, tolerance, terms, peak, this.quartered);
    this.errors.set(this.quartered, 3 * patch);
    const at = this.resultAt(patch);
    for (let i = 0; i < SHELL_TERMS; i++) output[at + 2 * i] = TERM_SIGNS[i] * terms[i];
    output[at + INWARD_AT] = 2 * peak.curvature;
    this.peaks.set(patch, peak);
  }

  private fillPowers(patch: number): void {
    const { net, powers, values } = this;
    const { input } = this.kernel;
    const at = this.at(patch);
    for (let i = 0; i < values; i++) net[i] = input[at + 2 * i];
    this.kit.regularToPowers(net, powers);
    for (let axis = 0; axis < 3; axis++) powers[axis] -= input[at + 2 * (values + axis)];
  }

  /** Raises `peak`, in the patch's frame, where the patch bends inwards more. */
  raise(patch: number, tolerance: number, peak: CurvaturePeak): void {
    if (!(this.kernel.output[this.resultAt(patch) + INWARD_AT] > 2 * peak.curvature)) return;
    const { found } = this;
    const known = this.peaks.get(patch);
    if (known === undefined) {
      found.curvature = 0;
      this.fillPowers(patch);
      this.kit.add(this.powers, tolerance, this.terms, found, this.unused);
    }
    const { curvature, x, y, z } = known ?? found;
    if (!(curvature > peak.curvature)) return;
    peak.curvature = curvature;
    peak.x = x;
    peak.y = y;
    peak.z = z;
  }

  /** Where a patch's first term stands in the kernel's output, the next ones two doubles apart each, all as TERM_SIGNS have them. */
  resultAt(patch: number): number {
    return (patch >> 1) * TOTALS_STRIDE + (patch & 1);
  }
}
