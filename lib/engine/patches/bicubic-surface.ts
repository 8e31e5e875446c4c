import { bicubicPowerArea } from '../kernel/bicubic-scalar';
import { netToPowers } from './bicubic-powers';
import { gaussRule } from './gauss-rule';

/** Gauss nodes a direction of the rule whose area the finer one's is compared with. */
export const COARSE_NODES = 4;

const FINE = gaussRule(7);
const COARSE = gaussRule(COARSE_NODES);

/** Part of a patch's area that its error may be; beyond it the patch is quartered. */
export const AREA_TOLERANCE = 1e-12;
const MOST_QUARTERINGS = 10;

const powers = new Float64Array(48);
const square = new Float64Array(10);

/**
 * Checks and if need be mends the ten surface moments of a bicubic patch: `surface` comes with the values of 7 × 7 nodes and leaves with an
 * error of about 1e-12 of the area. The integrand holds a root, so the error is estimated by comparing two rules and large ones are quartered.
 * `coarseArea` is the area by COARSE_NODES (see `bicubicArea`). Returns the estimated error of the area.
 */
export function mendSurfaceMoments(net: Float64Array, ox: number, oy: number, oz: number, surface: Float64Array, coarseArea: number): number {
  const error = areaError(surface[0], coarseArea);
  const tolerance = AREA_TOLERANCE * surface[0];
  if (!(error > tolerance)) return error;
  netToPowers(net, powers);
  powers[0] -= ox;
  powers[1] -= oy;
  powers[2] -= oz;
  const area = surface[0];
  surface.fill(0);
  return quarter(0, 0, 1, Math.abs(area - coarseArea), tolerance, 1, surface);
}

/** Area of a bicubic patch by COARSE_NODES a direction. */
export function bicubicArea(net: Float64Array): number {
  netToPowers(net, powers);
  return bicubicPowerArea(powers, COARSE);
}

/**
 * Estimated error of an area that came with that of a coarser rule. For an analytic integrand the error of n nodes falls as ρ^−2n, so that of 7 is that of 4
 * to the power 7/4; 3/2 leaves room.
 */
export function areaError(fine: number, coarse: number): number {
  if (!(fine > 0)) return 0;
  const change = Math.min(1, Math.abs(fine - coarse) / fine);
  return fine * change * Math.sqrt(change);
}

/** Share of a square's difference that its quarters must take off it for more quartering to be worth while; a spoilt rule gains nothing. */
const LEAST_GAIN = 0.3;
/** Quarterings that need no gain: a sharp bend shows none before squares of its own size. */
const PATIENCE = 5;

/**
 * Adds the moments of the four quarters of the square with the given centre, size and difference between the two rules, quartered again where they err too much;
 * returns their estimated error.
 */
function quarter(u: number, v: number, size: number, before: number, tolerance: number, depth: number, surface: Float64Array): number {
  const errors = [0, 0, 0, 0];
  const changes = [0, 0, 0, 0];
  const moments = new Float64Array(40);
  for (let i = 0; i < 4; i++) {
    const cu = u + (i & 1 ? size : -size) / 4;
    const cv = v + (i & 2 ? size : -size) / 4;
    momentsOf(cu, cv, size / 2, square);
    moments.set(square, 10 * i);
    const coarse = areaOf(cu, cv, size / 2);
    errors[i] = areaError(square[0], coarse);
    changes[i] = Math.abs(square[0] - coarse);
  }
  const goOn = depth < PATIENCE || (depth < MOST_QUARTERINGS && changes[0] + changes[1] + changes[2] + changes[3] < (1 - LEAST_GAIN) * before);
  let error = 0;
  for (let i = 0; i < 4; i++) {
    if (goOn && errors[i] > tolerance) {
      error += quarter(u + (i & 1 ? size : -size) / 4, v + (i & 2 ? size : -size) / 4, size / 2, changes[i], tolerance, depth + 1, surface);
      continue;
    }
    // What is given up unresolved does not converge geometrically: there the whole difference counts.
    error += errors[i] > tolerance ? changes[i] : errors[i];
    for (let k = 0; k < 10; k++) surface[k] += moments[10 * i + k];
  }
  return error;
}

const point = new Float64Array(3);
const alongU = new Float64Array(3);
const alongV = new Float64Array(3);

/** Evaluates the patch at (u, v) about its middle; returns |X_u × X_v|. */
function evaluate(u: number, v: number): number {
  for (let axis = 0; axis < 3; axis++) {
    let x = 0, xu = 0, xv = 0;
    for (let i = 3; i >= 0; i--) {
      const at = 12 * i + axis;
      const row = powers[at] + v * (powers[at + 3] + v * (powers[at + 6] + v * powers[at + 9]));
      const slope = powers[at + 3] + v * (2 * powers[at + 6] + 3 * v * powers[at + 9]);
      xu = xu * u + x;
      x = x * u + row;
      xv = xv * u + slope;
    }
    point[axis] = x;
    alongU[axis] = xu;
    alongV[axis] = xv;
  }
  const nx = alongU[1] * alongV[2] - alongU[2] * alongV[1];
  const ny = alongU[2] * alongV[0] - alongU[0] * alongV[2];
  const nz = alongU[0] * alongV[1] - alongU[1] * alongV[0];
  return Math.sqrt(nx * nx + ny * ny + nz * nz);
}

function areaOf(u: number, v: number, size: number): number {
  const { nodes, weights } = COARSE;
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) for (let j = 0; j < nodes.length; j++) sum += weights[i] * weights[j] * evaluate(u + size * nodes[i], v + size * nodes[j]);
  return sum * size * size;
}

function momentsOf(u: number, v: number, size: number, out: Float64Array): void {
  const { nodes, weights } = FINE;
  out.fill(0);
  for (let i = 0; i < nodes.length; i++) {
    for (let j = 0; j < nodes.length; j++) {
      const a = weights[i] * weights[j] * size * size * evaluate(u + size * nodes[i], v + size * nodes[j]);
      const [x, y, z] = point;
      out[0] += a;
      out[1] += a * x;
      out[2] += a * y;
      out[3] += a * z;
      out[4] += a * x * x;
      out[5] += a * y * y;
      out[6] += a * z * z;
      out[7] += a * x * y;
      out[8] += a * x * z;
      out[9] += a * y * z;
    }
  }
}
