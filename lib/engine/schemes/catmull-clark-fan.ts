import { CORNER_CENTRE, CREASE_CENTRE } from './classify-vertices';
import { isSharpSpoke, iterateLimit, putSectorPoint, spokeAt, type FanState } from './fan-state';

/**
 * One step of refinement [Catmull & Clark 1978]: the rings 0 to 2 of `from` give the rings 0 to 3 of `to`.
 * Sharp spokes follow the crease rule (1, 6, 1)/8, whatever their end in the second ring: phantom points make a corner there of it.
 */
export function refineFan(from: FanState, to: FanState): void {
  const n = from.sectors;
  const spokeCount = from.closed ? n : n + 1;
  for (let axis = 0; axis < 3; axis++) {
    const c = from.centre[axis];
    const S = (offset: number, a: number): number => from.spokes[offset + 3 * (a - 1) + axis];
    let spokeSum = 0;
    let faceSum = 0;
    for (let j = 0; j < n; j++) {
      const p = spokeAt(from, j, 0);
      const q = spokeAt(from, j, 1);
      const at = 27 * j + axis;
      const f11 = from.inner[at], f12 = from.inner[at + 3], f21 = from.inner[at + 9], f22 = from.inner[at + 12];
      const p1 = S(p, 1), p2 = S(p, 2), q1 = S(q, 1), q2 = S(q, 2);
      const face = (c + p1 + q1 + f11) / 4;
      const face31 = (p1 + p2 + f11 + f21) / 4;
      const face13 = (q1 + q2 + f11 + f12) / 4;
      const face33 = (f11 + f21 + f12 + f22) / 4;
      to.inner[at] = face;
      to.inner[at + 3] = (q1 + f11 + face + face13) / 4;
      to.inner[at + 6] = face13;
      to.inner[at + 9] = (p1 + f11 + face + face31) / 4;
      to.inner[at + 12] = f11 / 2 + (p1 + q1 + f21 + f12 + face + face31 + face13 + face33) / 16;
      to.inner[at + 15] = (f11 + f12 + face13 + face33) / 4;
      to.inner[at + 18] = face31;
      to.inner[at + 21] = (f11 + f21 + face31 + face33) / 4;
      to.inner[at + 24] = face33;
      spokeSum += p1;
      faceSum += face;
    }
    for (let spoke = 0; spoke < spokeCount; spoke++) {
      const p = 9 * spoke;
      const p1 = S(p, 1), p2 = S(p, 2);
      if (isSharpSpoke(from, spoke)) {
        to.spokes[p + axis] = (c + p1) / 2;
        to.spokes[p + 3 + axis] = (c + 6 * p1 + p2) / 8;
        to.spokes[p + 6 + axis] = (p1 + p2) / 2;
        continue;
      }
      const after = 27 * spoke + axis;
      const before = 27 * (spoke === 0 ? n - 1 : spoke - 1) + axis;
      const faceAfter = to.inner[after], faceBefore = to.inner[before];
      const farAfter = to.inner[after + 18], farBefore = to.inner[before + 6];
      to.spokes[p + axis] = (c + p1 + faceAfter + faceBefore) / 4;
      to.spokes[p + 3 + axis] = p1 / 2 + (c + p2 + from.inner[after] + from.inner[before] + faceAfter + faceBefore + farAfter + farBefore) / 16;
      to.spokes[p + 6 + axis] = (p1 + p2 + farAfter + farBefore) / 4;
    }
    if (from.centreRule === CORNER_CENTRE) to.centre[axis] = c;
    else if (from.centreRule === CREASE_CENTRE) to.centre[axis] = (6 * c + from.spokes[axis] + from.spokes[9 * n + axis]) / 8;
    else to.centre[axis] = ((n - 2) / n) * c + (spokeSum + faceSum) / (n * n);
  }
}

/**
 * Net of one of the three regular child quads of a sector: 0 beside spoke j (a from 1 to 2, b from 0 to 1), 1 the far one, 2 beside spoke j + 1.
 * Layout as `bicubicMoments` wants it: rows along a, columns along b. Across sharp spokes stand the phantom points 2a − b.
 */
export function fillChildNet(fan: FanState, sector: number, child: number, net: Float64Array): void {
  const rowBase = child === 2 ? -1 : 0;
  const columnBase = child === 0 ? -1 : 0;
  for (let row = 0; row < 4; row++) {
    for (let column = 0; column < 4; column++) {
      const a = row + rowBase;
      const b = column + columnBase;
      if (a >= 0 && b >= 0) putSectorPoint(fan, sector, a, b, net, 3 * (4 * row + column));
    }
  }
  const n = fan.sectors;
  if (child === 0) {
    const sharp = isSharpSpoke(fan, sector);
    const before = sector === 0 ? n - 1 : sector - 1;
    for (let row = 0; row < 4; row++) {
      const at = 12 * row;
      if (sharp) phantom(net, at, at + 3, at + 6);
      else putSectorPoint(fan, before, 1, row, net, at);
    }
  } else if (child === 2) {
    const sharp = isSharpSpoke(fan, fan.closed && sector + 1 === n ? 0 : sector + 1);
    const after = sector + 1 === n ? 0 : sector + 1;
    for (let column = 0; column < 4; column++) {
      const at = 3 * column;
      if (sharp) phantom(net, at, at + 12, at + 24);
      else putSectorPoint(fan, after, column, 1, net, at);
    }
  }
}

function phantom(net: Float64Array, to: number, edge: number, inner: number): void {
  for (let axis = 0; axis < 3; axis++) net[to + axis] = 2 * net[edge + axis] - net[inner + axis];
}

/** The centre's limit point, good to rounding: a mask where one is known, else enough refinements. */
export function approximateLimit(fan: FanState): Float64Array {
  const n = fan.sectors;
  const limit = Float64Array.from(fan.centre);
  if (fan.centreRule === CORNER_CENTRE) return limit;
  if (fan.centreRule === CREASE_CENTRE) {
    for (let axis = 0; axis < 3; axis++) limit[axis] = (4 * fan.centre[axis] + fan.spokes[axis] + fan.spokes[9 * n + axis]) / 6;
    return limit;
  }
  if (!fan.sharpFirst && n > 2) {
    for (let axis = 0; axis < 3; axis++) {
      let sum = n * n * fan.centre[axis];
      for (let j = 0; j < n; j++) sum += 4 * fan.spokes[9 * j + axis] + fan.inner[27 * j + axis];
      limit[axis] = sum / (n * (n + 5));
    }
    return limit;
  }
  return iterateLimit(fan, refineFan);
}
