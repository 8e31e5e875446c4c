import { orient2d, orient3d } from 'robust-predicates';

/** Side of the plane through the triangle at `t` (nine numbers: a, b, c) on which the point at `p` lies; exact in sign [Shewchuk 1997]. */
function sideOf(t: Float64Array, at: number, points: Float64Array, p: number): number {
  return orient3d(
    t[at], t[at + 1], t[at + 2], t[at + 3], t[at + 4], t[at + 5], t[at + 6], t[at + 7], t[at + 8], points[p], points[p + 1], points[p + 2],
  );
}

/** Sign of the tetrahedron over the segment p q and the edge u v. */
function turn(p: Float64Array, i: number, q: number, t: Float64Array, u: number, v: number): number {
  return orient3d(p[i], p[i + 1], p[i + 2], p[q], p[q + 1], p[q + 2], t[u], t[u + 1], t[u + 2], t[v], t[v + 1], t[v + 2]);
}

/** Whether the segment from `i` to `q` in `p` goes from one side of the triangle at `t` to the other through it or its edge. */
function segmentCrosses(p: Float64Array, i: number, q: number, sideI: number, sideQ: number, t: Float64Array, at: number): boolean {
  if (!((sideI > 0 && sideQ < 0) || (sideI < 0 && sideQ > 0))) return false;
  const ab = turn(p, i, q, t, at, at + 3);
  const bc = turn(p, i, q, t, at + 3, at + 6);
  const ca = turn(p, i, q, t, at + 6, at);
  return (ab >= 0 && bc >= 0 && ca >= 0) || (ab <= 0 && bc <= 0 && ca <= 0);
}

/**
 * Whether an edge of one triangle passes from one side of the other to the other side, through it. Triangles are nine numbers each, a, b, c.
 * Exact: no tolerance. Triangles in one plane, or that touch without passing through, do not cross.
 */
export function trianglesCross(s: Float64Array, i: number, t: Float64Array, j: number): boolean {
  const sa = sideOf(t, j, s, i);
  const sb = sideOf(t, j, s, i + 3);
  const sc = sideOf(t, j, s, i + 6);
  if ((sa >= 0 && sb >= 0 && sc >= 0) || (sa <= 0 && sb <= 0 && sc <= 0)) return false;
  const ta = sideOf(s, i, t, j);
  const tb = sideOf(s, i, t, j + 3);
  const tc = sideOf(s, i, t, j + 6);
  if ((ta >= 0 && tb >= 0 && tc >= 0) || (ta <= 0 && tb <= 0 && tc <= 0)) return false;
  return segmentCrosses(s, i, i + 3, sa, sb, t, j) || segmentCrosses(s, i + 3, i + 6, sb, sc, t, j) || segmentCrosses(s, i + 6, i, sc, sa, t, j)
    || segmentCrosses(t, j, j + 3, ta, tb, s, i) || segmentCrosses(t, j + 3, j + 6, tb, tc, s, i) || segmentCrosses(t, j + 6, j, tc, ta, s, i);
}

/**
 * How often, signed, the ray from (x, y, z) along +x passes through the triangle: 1 where it leaves (the triangle looks along +x), −1 where it enters.
 * Edges count half-open and exactly, so that a ray through an edge or vertex of a closed surface meets exactly one of the triangles there.
 */
export function rayCrossing(t: Float64Array, at: number, x: number, y: number, z: number): number {
  let winding = 0;
  for (let i = 0; i < 3; i++) {
    const a = at + 3 * i;
    const b = at + 3 * ((i + 1) % 3);
    const fromBelow = t[a + 2] <= z;
    const toBelow = t[b + 2] <= z;
    if (fromBelow === toBelow) continue;
    const side = orient2d(t[a + 1], t[a + 2], t[b + 1], t[b + 2], y, z);
    if (fromBelow && side * LEFT > 0) winding++;
    else if (!fromBelow && side * LEFT < 0) winding--;
  }
  if (winding === 0) return 0;
  const above = orient3d(t[at], t[at + 1], t[at + 2], t[at + 3], t[at + 4], t[at + 5], t[at + 6], t[at + 7], t[at + 8], x, y, z) * ABOVE;
  // Seen from +x the triangle turns by `winding`; the point lies before it where it is on the other side.
  return above * winding < 0 ? winding : 0;
}

/** What the package's signs mean: for c to the left of a → b, and for d on the side from which a, b, c turn counter-clockwise. */
const LEFT = Math.sign(orient2d(0, 0, 1, 0, 0, 1));
const ABOVE = Math.sign(orient3d(0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1));
