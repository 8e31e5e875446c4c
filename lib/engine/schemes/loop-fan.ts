import { TRIANGLE_NET } from '../patches/box-spline';
import { CORNER_CENTRE, CREASE_CENTRE } from './classify-vertices';
import { isSharpSpoke, iterateLimit, putSectorPoint, spokeAt, type FanState } from './fan-state';

/** Loop's weight of each neighbour of a smooth vertex with n of them [Loop 1987]: (5/8 − (3/8 + cos(2π/n)/4)²)/n. */
export function loopWeight(n: number): number {
  return (5 / 8 - (3 / 8 + Math.cos((2 * Math.PI) / n) / 4) ** 2) / n;
}

/**
 * One step of refinement [Loop 1987]: the rings 0 to 2 of `from` give the rings 0 to 3 of `to`. The grid of a sector is the triangles' lattice:
 * its points (a, b) have a + b ≤ 3. Sharp spokes follow the crease rule (1, 6, 1)/8.
 */
export function refineLoopFan(from: FanState, to: FanState): void {
  const n = from.sectors;
  const spokeCount = from.closed ? n : n + 1;
  const weight = loopWeight(n);
  for (let axis = 0; axis < 3; axis++) {
    const c = from.centre[axis];
    let spokeSum = 0;
    for (let j = 0; j < n; j++) {
      const p = spokeAt(from, j, 0) + axis;
      const q = spokeAt(from, j, 1) + axis;
      const p1 = from.spokes[p], p2 = from.spokes[p + 3], q1 = from.spokes[q], q2 = from.spokes[q + 3];
      const f = from.inner[27 * j + axis];
      const at = 27 * j + axis;
      to.inner[at] = (3 * (p1 + q1) + c + f) / 8;
      to.inner[at + 9] = (3 * (p1 + f) + q1 + p2) / 8;
      to.inner[at + 3] = (3 * (q1 + f) + p1 + q2) / 8;
      spokeSum += p1;
    }
    for (let spoke = 0; spoke < spokeCount; spoke++) {
      const p = 9 * spoke + axis;
      const p1 = from.spokes[p], p2 = from.spokes[p + 3];
      if (isSharpSpoke(from, spoke)) {
        to.spokes[p] = (c + p1) / 2;
        to.spokes[p + 3] = (c + 6 * p1 + p2) / 8;
        to.spokes[p + 6] = (p1 + p2) / 2;
        continue;
      }
      const before = spoke === 0 ? n - 1 : spoke - 1;
      const nextSpoke = from.spokes[spokeAt(from, spoke, 1) + axis];
      const lastSpoke = from.spokes[spokeAt(from, before, 0) + axis];
      const after = from.inner[27 * spoke + axis];
      const earlier = from.inner[27 * before + axis];
      to.spokes[p] = (3 * (c + p1) + nextSpoke + lastSpoke) / 8;
      to.spokes[p + 3] = (10 * p1 + c + p2 + after + earlier + nextSpoke + lastSpoke) / 16;
      to.spokes[p + 6] = (3 * (p1 + p2) + after + earlier) / 8;
    }
    if (from.centreRule === CORNER_CENTRE) to.centre[axis] = c;
    else if (from.centreRule === CREASE_CENTRE) to.centre[axis] = (6 * c + from.spokes[axis] + from.spokes[9 * n + axis]) / 8;
    else to.centre[axis] = (1 - n * weight) * c + weight * spokeSum;
  }
}

/** The centre's limit point: (⅜v + nβ · mean e)/(⅜ + nβ) where smooth, (4v + e₀ + eₙ)/6 on creases. */
export function loopLimit(fan: FanState): Float64Array {
  const n = fan.sectors;
  const limit = Float64Array.from(fan.centre);
  if (fan.centreRule === CORNER_CENTRE) return limit;
  if (fan.centreRule === CREASE_CENTRE) {
    for (let axis = 0; axis < 3; axis++) limit[axis] = (4 * fan.centre[axis] + fan.spokes[axis] + fan.spokes[9 * n + axis]) / 6;
    return limit;
  }
  if (fan.sharpFirst) return iterateLimit(fan, refineLoopFan);
  const weight = loopWeight(n);
  for (let axis = 0; axis < 3; axis++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += fan.spokes[9 * j + axis];
    limit[axis] = (0.375 * fan.centre[axis] + weight * sum) / (0.375 + n * weight);
  }
  return limit;
}

/** Point (a, b) of a sector, also one step across its spokes, into `net`; phantom points a + b − c across sharp spokes. */
function putPoint(fan: FanState, sector: number, a: number, b: number, net: Float64Array, at: number): void {
  const n = fan.sectors;
  if (b < 0) {
    if (isSharpSpoke(fan, sector)) mirror(fan, sector, [a - 1, 0], [a, 0], [a - 1, 1], net, at);
    else putPoint(fan, sector === 0 ? n - 1 : sector - 1, 1, a - 1, net, at);
    return;
  }
  if (a < 0) {
    if (isSharpSpoke(fan, fan.closed && sector + 1 === n ? 0 : sector + 1)) mirror(fan, sector, [0, b - 1], [0, b], [1, b - 1], net, at);
    else putPoint(fan, sector + 1 === n ? 0 : sector + 1, b - 1, 1, net, at);
    return;
  }
  putSectorPoint(fan, sector, a, b, net, at);
}

const corner = new Float64Array(9);

function mirror(fan: FanState, sector: number, p: [number, number], q: [number, number], inner: [number, number], net: Float64Array, at: number): void {
  putPoint(fan, sector, p[0], p[1], corner, 0);
  putPoint(fan, sector, q[0], q[1], corner, 3);
  putPoint(fan, sector, inner[0], inner[1], corner, 6);
  for (let axis = 0; axis < 3; axis++) net[at + axis] = corner[axis] + corner[3 + axis] - corner[6 + axis];
}

/**
 * Net (TRIANGLE_NET) of a regular child of a sector: 0 at (1, 0), (2, 0), (1, 1); 1 the middle one at (1, 1), (0, 1), (1, 0), which stands on its head;
 * 2 at (0, 1), (1, 1), (0, 2).
 */
export function fillLoopChild(fan: FanState, sector: number, child: number, net: Float64Array): void {
  const [a0, b0, sign] = child === 0 ? [1, 0, 1] : child === 1 ? [1, 1, -1] : [0, 1, 1];
  for (let i = 0; i < 12; i++) putPoint(fan, sector, a0 + sign * TRIANGLE_NET[i][0], b0 + sign * TRIANGLE_NET[i][1], net, 3 * i);
}
