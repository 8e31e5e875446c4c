import { MOMENTS } from '../moments/sums';
import { triangleRule, triangleToPowers } from './box-spline';

const powers = new Float64Array(45);
const part = new Float64Array(MOMENTS);

/** Nodes of `triangleRule` that are exact for the solid moments of a quartic triangle: degree 17. */
export const TRIANGLE_NODES = 9;
const COARSE_NODES = 6;

/** Part of a patch's area that its error may be; beyond it the triangle is quartered. */
const TOLERANCE = 1e-12;
const MOST_QUARTERINGS = 10;
/** Share of a triangle's difference between two rules that its quarters must take off it for more quartering to be worth while. */
const LEAST_GAIN = 0.3;
/** Quarterings that need no gain: a sharp bend shows none before squares of its own size. */
const PATIENCE = 5;

/**
 * Ten solid and ten surface moments of a quartic box-spline triangle with the net of TRIANGLE_NET, corners counter-clockwise seen from outside.
 * Solid moments are those of the cone from (ox, oy, oz), about that point, exact with TRIANGLE_NODES; surface moments hold a root.
 * Returns the magnitude that the volume's rounding error is relative to.
 */
export function boxSplineMoments(net: Float64Array, ox: number, oy: number, oz: number, nodes: number, solid: Float64Array, surface: Float64Array): number {
  const p = powers;
  triangleToPowers(net, p);
  p[0] -= ox;
  p[1] -= oy;
  p[2] -= oz;
  const { count, weights, table } = triangleRule(nodes);
  let magnitude = 0;
  let m = 0, mx = 0, my = 0, mz = 0, mxx = 0, myy = 0, mzz = 0, mxy = 0, mxz = 0, myz = 0;
  surface.fill(0);
  for (let node = 0; node < count; node++) {
    let x = 0, y = 0, z = 0, xs = 0, ys = 0, zs = 0, xt = 0, yt = 0, zt = 0;
    const row = 45 * node;
    for (let k = 0; k < 45; k += 3) {
      const value = table[row + k], bs = table[row + k + 1], bt = table[row + k + 2];
      const px = p[k], py = p[k + 1], pz = p[k + 2];
      x += value * px;
      y += value * py;
      z += value * pz;
      xs += bs * px;
      ys += bs * py;
      zs += bs * pz;
      xt += bt * px;
      yt += bt * py;
      zt += bt * pz;
    }
    const nx = ys * zt - zs * yt, ny = zs * xt - xs * zt, nz = xs * yt - ys * xt;
    const w = weights[node];
    const px = x * nx, py = y * ny, pz = z * nz;
    const d = w * (px + py + pz);
    magnitude += w * (Math.abs(px) + Math.abs(py) + Math.abs(pz));
    m += d;
    mx += d * x;
    my += d * y;
    mz += d * z;
    mxx += d * x * x;
    myy += d * y * y;
    mzz += d * z * z;
    mxy += d * x * y;
    mxz += d * x * z;
    myz += d * y * z;
    addPoint(w * Math.sqrt(nx * nx + ny * ny + nz * nz), x, y, z, surface);
  }
  solid[0] = m / 3;
  solid[1] = mx / 4;
  solid[2] = my / 4;
  solid[3] = mz / 4;
  solid[4] = mxx / 5;
  solid[5] = myy / 5;
  solid[6] = mzz / 5;
  solid[7] = mxy / 5;
  solid[8] = mxz / 5;
  solid[9] = myz / 5;
  return magnitude / 3;
}

function addPoint(a: number, x: number, y: number, z: number, surface: Float64Array): void {
  surface[0] += a;
  surface[1] += a * x;
  surface[2] += a * y;
  surface[3] += a * z;
  surface[4] += a * x * x;
  surface[5] += a * y * y;
  surface[6] += a * z * z;
  surface[7] += a * x * y;
  surface[8] += a * x * z;
  surface[9] += a * y * z;
}

/** As `mendSurfaceMoments` does for quads: checks the surface moments found with TRIANGLE_NODES and quarters the triangle where two rules differ. */
export function mendTriangleSurface(net: Float64Array, ox: number, oy: number, oz: number, surface: Float64Array): number {
  triangleToPowers(net, powers);
  powers[0] -= ox;
  powers[1] -= oy;
  powers[2] -= oz;
  const change = changeOf(surface[0], 0, 0, 1);
  const error = geometricError(surface[0], change);
  const tolerance = TOLERANCE * surface[0];
  if (!(error > tolerance)) return error;
  surface.fill(0);
  return quarter(0, 0, 1, change, tolerance, 1, surface);
}

/** Difference of an area to that of the coarse rule. */
function changeOf(area: number, s: number, t: number, size: number): number {
  part.fill(0);
  addTriangle(s, t, size, COARSE_NODES, part);
  return Math.abs(part[0] - area);
}

/** Estimated error of an area where both rules converge geometrically: the coarse rule's relative error to the power 3/2. */
function geometricError(area: number, change: number): number {
  if (!(area > 0)) return 0;
  const relative = Math.min(1, change / area);
  return area * relative * Math.sqrt(relative);
}

/** Quarters of the triangle (s, t), (s + size, t), (s, t + size); a negative size turns it by half a turn. */
function quartersOf(s: number, t: number, size: number): [number, number, number][] {
  const half = size / 2;
  return [[s, t, half], [s + half, t, half], [s, t + half, half], [s + half, t + half, -half]];
}

function quarter(s: number, t: number, size: number, before: number, tolerance: number, depth: number, surface: Float64Array): number {
  const quarters = quartersOf(s, t, size).map(([qs, qt, half]) => {
    const moments = new Float64Array(MOMENTS);
    addTriangle(qs, qt, half, TRIANGLE_NODES, moments);
    const change = changeOf(moments[0], qs, qt, half);
    return { qs, qt, half, moments, change, error: geometricError(moments[0], change) };
  });
  const goOn = depth < PATIENCE || (depth < MOST_QUARTERINGS && quarters.reduce((sum, { change }) => sum + change, 0) < (1 - LEAST_GAIN) * before);
  let error = 0;
  for (const { qs, qt, half, moments, change, error: own } of quarters) {
    if (goOn && own > tolerance) {
      error += quarter(qs, qt, half, change, tolerance, depth + 1, surface);
      continue;
    }
    // What is given up unresolved does not converge geometrically: there the whole difference counts.
    error += own > tolerance ? change : own;
    for (let k = 0; k < MOMENTS; k++) surface[k] += moments[k];
  }
  return error;
}

function addTriangle(s0: number, t0: number, size: number, nodes: number, out: Float64Array): void {
  const rule = triangleRule(nodes);
  const p = powers;
  for (let node = 0; node < rule.count; node++) {
    const s = s0 + size * rule.s[node];
    const t = t0 + size * rule.t[node];
    const point = [0, 0, 0], ds = [0, 0, 0], dt = [0, 0, 0];
    for (let axis = 0; axis < 3; axis++) {
      // Monomials in the order 1 | s t | s² st t² | …: by degree, descending in s.
      for (let degree = 0, k = 0; degree <= 4; degree++) {
        for (let j = 0; j <= degree; j++, k++) {
          const i = degree - j;
          const c = p[3 * k + axis];
          point[axis] += c * s ** i * t ** j;
          if (i > 0) ds[axis] += c * i * s ** (i - 1) * t ** j;
          if (j > 0) dt[axis] += c * j * s ** i * t ** (j - 1);
        }
      }
    }
    const nx = ds[1] * dt[2] - ds[2] * dt[1], ny = ds[2] * dt[0] - ds[0] * dt[2], nz = ds[0] * dt[1] - ds[1] * dt[0];
    addPoint(rule.weights[node] * size * size * Math.sqrt(nx * nx + ny * ny + nz * nz), point[0], point[1], point[2], out);
  }
}
