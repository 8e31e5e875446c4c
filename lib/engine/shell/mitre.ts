import type { ShellBody } from './shell-sums';
import { PAIRS } from './shell-terms';

/** 1 + cos θ below which two faces lie back to back: no mitre closes them. */
export const FOLDED = 1e-6;

const p = new Float64Array(3);
const q = new Float64Array(3);
const first = new Float64Array(3);
const bentFirst = new Float64Array(3);

/** Where a sharp edge is looked at. Lengths in the cage's unit; vectors in one frame. */
export interface EdgePoint {
  /** The point about the body's origin. */
  point: ArrayLike<number>;
  /** Unit tangent, the body's own face on the left. */
  tangent: ArrayLike<number>;
  /** The edge's curvature vector, across the tangent. */
  curvature: ArrayLike<number>;
  /** Unit normals, outwards, of the own face and of the one across. */
  own: ArrayLike<number>;
  across: ArrayLike<number>;
  /** Normal curvature of the own face across the edge: 1/R where it bends like a sphere. */
  bend: number;
}

/** tan(θ/2) of the signed turning angle θ, positive where the edge is convex; null where the faces are folded onto each other. */
export function mitreTangent({ tangent, own, across }: Pick<EdgePoint, 'tangent' | 'own' | 'across'>): number | null {
  const cosine = own[0] * across[0] + own[1] * across[1] + own[2] * across[2];
  if (!(1 + cosine > FOLDED)) return null;
  const x = own[1] * across[2] - own[2] * across[1], y = own[2] * across[0] - own[0] * across[2], z = own[0] * across[1] - own[1] * across[0];
  return (x * tangent[0] + y * tangent[1] + z * tangent[2]) / (1 + cosine);
}

/**
 * Adds the own face's half of the mitre over the length `ds` of a sharp edge to the body's polynomials, and returns ∫ tan(θ/2) ds.
 *
 * The walls of both faces sweep the kite 0, N₁, B, N₂ (times −t, B = (N₁ + N₂)/(1 + N₁·N₂)) twice where the edge is convex and not at all where it is
 * concave, so its signed area t² tan(θ/2) is taken off; each side takes the triangle 0, N, B. The point C − ty of the kite stands for the volume
 * (1 + t c·y) t² d²y ds, c the edge's curvature vector. With I_k the triangle's moments of degree k in y:
 * volume −(t² I₀ + t³ c·I₁), first −(C …) etc. by expanding (C − ty)(C − ty)ᵀ (1 + t c·y). Where the face bends by κ across the edge its inner wall leaves
 * the kite's straight side by κ y²/2, which adds κ tan³(θ/2)/6 to the area's t³.
 *
 * Exact for flat faces that meet in straight or circular edges (c·y then is the volume's whole change along the kite); for curved faces the volume is
 * exact to t³ and the moments are so relative to the edge's place C; corners, where edges meet, are left out from t³ on.
 */
export function addMitre(edge: EdgePoint, ds: number, shell: ShellBody): number {
  const tangent = mitreTangent(edge);
  if (tangent === null) {
    shell.errors[1] += ds / FOLDED;
    return 0;
  }
  const { point: C, own, across, curvature: c } = edge;
  const cosine = own[0] * across[0] + own[1] * across[1] + own[2] * across[2];
  const area = (-tangent / 2) * ds;
  let cp = 0, cq = 0;
  for (let axis = 0; axis < 3; axis++) {
    p[axis] = own[axis];
    q[axis] = (own[axis] + across[axis]) / (1 + cosine);
    cp += c[axis] * p[axis];
    cq += c[axis] * q[axis];
  }
  // Triangle 0, p, q: ∫ αᵃβᵇ = 2A a! b!/(a + b + 2)!, y = αp + βq.
  const bent = (area * (cp + cq)) / 3 - (edge.bend * tangent ** 3 * ds) / 6;
  const out = shell.mitres;
  out[1] += area;
  out[2] += bent;
  for (let axis = 0; axis < 3; axis++) {
    first[axis] = (area * (p[axis] + q[axis])) / 3;
    bentFirst[axis] = (area * (p[axis] * (2 * cp + cq) + q[axis] * (cp + 2 * cq))) / 12;
    const at = 5 * (1 + axis);
    out[at + 1] += area * C[axis];
    out[at + 2] += bent * C[axis] - first[axis];
    out[at + 3] -= bentFirst[axis];
  }
  for (let k = 0; k < PAIRS.length; k++) {
    const i = PAIRS[k][0], j = PAIRS[k][1];
    const pp = p[i] * p[j], qq = q[i] * q[j], pq = p[i] * q[j] + q[i] * p[j], cc = C[i] * C[j];
    const at = 5 * (4 + k);
    out[at + 1] += area * cc;
    out[at + 2] += bent * cc - (C[i] * first[j] + first[i] * C[j]);
    out[at + 3] += (area * (2 * pp + 2 * qq + pq)) / 12 - (C[i] * bentFirst[j] + bentFirst[i] * C[j]);
    out[at + 4] += 2 * area * (pp * (cp / 20 + cq / 60) + (pq * (cp + cq)) / 60 + qq * (cp / 60 + cq / 20));
  }
  return tangent * ds;
}
