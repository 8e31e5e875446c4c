import type { BorderCurves } from '../moments/border-curves';
import type { LevelMesh } from '../schemes/level-mesh';
import { OWN } from '../schemes/refinement-blocks';

/** One side of a patch that lies on a piece of a sharp edge of the cage. */
export interface CreasePiece {
  powers: Float64Array;
  side: number;
  /** It covers [from, from + share] of the edge, along the half-edge that it was added for. */
  from: number;
  share: number;
  /** What its frame's origin is in the cage's. */
  shift: ArrayLike<number>;
}

/** Shorter pieces towards an extraordinary point are left out: their normals drown in rounding where the surface's tangents turn parallel there. */
const LEAST_SHARE = 2 ** -18;

/** The patches' sides along sharp edges, by the cage's half-edge whose face lies on the left. */
export type CreaseSides = Map<number, CreasePiece[]>;

/**
 * Marks both half-edges of the sharp edges between measured faces in the cage's `borderOf`, beside the borders, so that the integration hands their patches' sides to
 * `curves`, and collects those.
 */
export function collectSides(cage: LevelMesh, curves: BorderCurves, coefficients: number, toPowers: (net: Float64Array, powers: Float64Array) => void): CreaseSides {
  const sides: CreaseSides = new Map();
  const borders = new Set<number>();
  let marked = false;
  for (let h = 0; h < cage.twin.length; h++) {
    if (cage.twin[h] < 0 || cage.edgeSharpness[h] !== Infinity || cage.live[cage.faceOf[h]] !== OWN) continue;
    if (cage.borderOf[h] >= 0) borders.add(h);
    cage.borderOf[h] = h;
    marked = true;
  }
  if (!marked) return sides;
  const { twin, edgeSharpness } = cage;
  curves.takeSide = (net, side, edge, from, share, shift) => {
    if (twin[edge] < 0 || edgeSharpness[edge] !== Infinity) return false;
    if (share < LEAST_SHARE) return !borders.has(edge);
    const powers = new Float64Array(coefficients);
    toPowers(net, powers);
    const piece = { powers, side, from, share, shift };
    const known = sides.get(edge);
    if (known === undefined) sides.set(edge, [piece]);
    else known.push(piece);
    return !borders.has(edge);
  };
  return sides;
}
