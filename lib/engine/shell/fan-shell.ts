import { tailLevels, tailWeights } from '../moments/tail-weights';
import { SMOOTH_CENTRE, type Fans } from '../schemes/classify-vertices';
import { makeFanState, translateFan, type FanState } from '../schemes/fan-state';
import type { LevelMesh } from '../schemes/level-mesh';
import { gaussImage, type ImageSide } from './gauss-image';
import type { ShellBlock } from './shell-block';
import { shellFall, type ShellKit } from './shell-kits';
import type { ShellBody } from './shell-sums';
import { addShifted, SHELL_TERMS, TERM_SIGNS, TERM_STARTS, type CurvaturePeak } from './shell-terms';

/** Digits to which the tail is closed. */
const TAIL_DIGITS = 10;

/** What a rule may err by at the first level, relatively; terms fall from level to level, and it may err by more as fast, but for the weights' sake. */
const FIRST_TOLERANCE = 5e-10;
const GROWTH_SHARE = 0.9;

/** Fans with a crease or corner have no closed formula for how their terms fall; this holds all but slow rests. */
const OTHER_FALL = 0.6;

/** Levels whose curvature counts for the smallest radius: at an extraordinary point it may grow without end, over a vanishing area. */
const CURVATURE_LEVELS = 1;

/** Gauss nodes on a stretch of the fan's rim: one rule and the finer one that it is compared with, until they agree. */
const IMAGE_NODES: readonly (readonly [number, number])[] = [[3, 4], [5, 7], [8, 10]];
const IMAGE_TOLERANCE = 1e-8;

const net = new Float64Array(48);

/** Adds the shell terms of an isolated fan: a level sequence as `integrateFan` has it, its Gaussian curvature from the rim where the fan is smooth and whole. */
export function addFanShell(kit: ShellKit, block: ShellBlock, mesh: LevelMesh, fans: Fans, index: number, origins: Float64Array, shells: ShellBody[]): void {
  const fan = kit.fan;
  const corners = fans.corners.slice(fans.starts[index], fans.starts[index + 1]);
  const n = corners.length;
  let state = makeFanState(n, fans.closed[index], fans.sharpFirst[index], fans.centre[index]);
  let finer = makeFanState(n, state.closed, state.sharpFirst, state.centreRule);
  const plain = state.closed && !state.sharpFirst && state.centreRule === SMOOTH_CENTRE;
  fan.read(mesh, corners, state);
  const limit = fan.limit(state);
  translateFan(state, limit);
  const bodies = corners.map((corner) => fan.body(mesh, corner));
  const fall = plain ? shellFall(kit, n) : OTHER_FALL;
  const levels = tailLevels(fall, TAIL_DIGITS);
  const weights = tailWeights(fall, levels);
  const check = tailWeights(fall, levels - 1);
  const sums = new Float64Array(SHELL_TERMS * n);
  const earlier = new Float64Array(SHELL_TERMS * n);
  const powers = new Float64Array(kit.coefficients);
  const peaks = corners.map((): CurvaturePeak => ({ curvature: 0, x: 0, y: 0, z: 0 }));
  const rim: ImageSide[] = [];
  const whole = plain && bodies.every((body) => body === bodies[0]);
  let tolerance = FIRST_TOLERANCE;
  for (let k = 0; k < levels; k++, tolerance *= GROWTH_SHARE / fall) {
    fan.refine(state, finer);
    [state, finer] = [finer, state];
    if (k === 0 && whole) collectRim(kit, state, powers, rim);
    for (let j = 0; j < n; j++) {
      // As many sectors together as the block holds.
      const place = 3 * (j % Math.floor(block.size / 3));
      if (place === 0) computeSectors(kit, block, state, j, tolerance);
      for (let child = 0; child < 3; child++) {
        const from = block.resultAt(place + child);
        for (let i = 0; i < SHELL_TERMS; i++) {
          const term = TERM_SIGNS[i] * block.kernel.output[from + 2 * i];
          sums[SHELL_TERMS * j + i] += weights[k] * term;
          if (k + 1 < levels) earlier[SHELL_TERMS * j + i] += check[k] * term;
        }
        for (let i = 0; i < 3; i++) shells[bodies[j]].errors[i] += Math.abs(weights[k]) * block.errors[3 * (place + child) + i];
        if (k < CURVATURE_LEVELS) block.raise(place + child, tolerance, peaks[j]);
      }
    }
  }
  const seen = whole ? closeImage(rim) : null;
  if (seen !== null) takeImage(sums, n, seen.image);
  for (let j = 0; j < n; j++) {
    const shell = shells[bodies[j]];
    const at = SHELL_TERMS * j;
    shell.errors[1] += Math.abs(sums[at] - earlier[at]);
    if (seen === null) shell.errors[2] += Math.abs(sums[at + 1] - earlier[at + 1]);
    const shift = [0, 1, 2].map((axis) => limit[axis] - origins[3 * bodies[j] + axis]);
    addShifted(sums, at, shift[0], shift[1], shift[2], shell.terms);
    if (peaks[j].curvature > shell.peak.curvature) {
      Object.assign(shell.peak, { curvature: peaks[j].curvature, x: peaks[j].x + shift[0], y: peaks[j].y + shift[1], z: peaks[j].z + shift[2] });
    }
  }
  if (seen !== null) shells[bodies[0]].errors[2] += seen.error;
}

/** The Gauss map's integrals from the rim with an estimate of what they err by; null where it spreads too far. */
function closeImage(rim: readonly ImageSide[]): { image: Float64Array; error: number } | null {
  for (const [nodes, finer] of IMAGE_NODES) {
    const coarse = gaussImage(rim, nodes);
    const image = coarse === null ? null : gaussImage(rim, finer);
    if (coarse === null || image === null) return null;
    const error = image.reduce((worst, value, i) => Math.max(worst, Math.abs(value - coarse[i])), 0);
    if (error <= IMAGE_TOLERANCE || finer === IMAGE_NODES[IMAGE_NODES.length - 1][1]) return { image, error };
  }
  return null;
}

function imageSide(kit: ShellKit, powers: Float64Array, side: number): ImageSide {
  return { jet: (along, out) => kit.sideJet(powers, side, along, out), u: kit.along[side][0], v: kit.along[side][1] };
}

/** Sides of the fan's rim after its first refinement. */
function collectRim(kit: ShellKit, state: FanState, powers: Float64Array, rim: ImageSide[]): void {
  for (let j = 0; j < state.sectors; j++) {
    for (const [child, side] of kit.outerSides) {
      kit.fan.fillChild(state, j, child, net);
      kit.toPowers(net, powers);
      rim.push(imageSide(kit, powers.slice(), side));
    }
  }
}

/** Computes the patches of as many sectors from `first` on as the block holds. */
function computeSectors(kit: ShellKit, block: ShellBlock, state: FanState, first: number, tolerance: number): void {
  const sectors = Math.min(state.sectors - first, Math.floor(block.size / 3));
  for (let i = 0; i < sectors; i++) {
    for (let child = 0; child < 3; child++) {
      kit.fan.fillPoints(state, first + i, child, net);
      block.put(3 * i + child, net, 0, 0, 0);
    }
  }
  block.compute(3 * sectors, tolerance);
}

/** Puts the integrals of K, K N and K N Nᵀ about the limit point, which the closing would leave the largest rest of, in the sectors' place: all in the first. */
function takeImage(sums: Float64Array, sectors: number, image: Float64Array): void {
  for (let j = 0; j < sectors; j++) {
    const at = SHELL_TERMS * j;
    const part = j === 0 ? 1 : 0;
    sums[at + TERM_STARTS[1][0]] = part * image[0];
    for (let i = 0; i < 3; i++) sums[at + TERM_STARTS[2][1] + i] = -part * image[1 + i];
    for (let i = 0; i < 6; i++) sums[at + TERM_STARTS[3][2] + i] = part * image[4 + i];
  }
}
