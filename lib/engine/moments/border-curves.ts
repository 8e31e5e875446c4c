/** Powers 0 to 4 of three coordinates. */
export const CURVE_POWERS = 15;

/** Sees the net of a patch whose side is the piece [from, from + share] of a marked edge, in a frame whose origin is `shift`. */
export type TakeSide = (net: Float64Array, side: number, edge: number, from: number, share: number, shift: ArrayLike<number>) => boolean;

/**
 * Pieces of the limit curves over the border edges of bodies: quartics (cubics where the scheme has those) in powers of t − ½, oriented along the cage's half-edge they belong to.
 * `weight` closes sequences of pieces towards an extraordinary point; `share` is the piece's part of its cage edge's parameter range.
 */
export class BorderCurves {
  readonly edges: number[] = [];
  readonly weights: number[] = [];
  readonly shares: number[] = [];
  /** By how much a closing one level earlier weighs each piece less. */
  readonly doubts: number[] = [];
  /** CURVE_POWERS numbers per piece: [power · 3 + axis]. */
  readonly powers: number[] = [];
  /** Limit points at the ends of edges, by 2 · edge + end. */
  readonly ends = new Map<number, [number, number, number]>();
  /** Shown each side first, by its patch's net; true keeps it from being added. */
  takeSide: TakeSide | null = null;

  /** Adds the side `side` (0 … 3, counter-clockwise from corner (1,1) to (2,1)) of a bicubic net laid out as `bicubicMoments` wants it, moved by `shift`. The piece covers [from, from + share] of the edge. */
  addSide(net: Float64Array, side: number, edge: number, weight: number, from: number, share: number, shift: ArrayLike<number>): void {
    if (this.takeSide?.(net, side, edge, from, share, shift) === true) return;
    const alongRows = side === 0 || side === 2;
    const reversed = side >= 2;
    // Across the side the B-spline's values at the knot are (1, 4, 1)/6.
    const first = side === 0 || side === 3 ? 0 : 1;
    const control = [0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0];
    for (let i = 0; i < 4; i++) {
      const along = reversed ? 3 - i : i;
      for (let axis = 0; axis < 3; axis++) {
        const at = (across: number): number => net[3 * (alongRows ? 4 * along + across : 4 * across + along) + axis];
        control[3 * i + axis] = (at(first) + 4 * at(first + 1) + at(first + 2)) / 6;
      }
    }
    for (let axis = 0; axis < 3; axis++) {
      const c0 = control[axis], c1 = control[3 + axis], c2 = control[6 + axis], c3 = control[9 + axis];
      const s0 = c0 + c3, s1 = c1 + c2, d0 = c3 - c0, d1 = c2 - c1;
      control[axis] = (s0 + 23 * s1) / 48;
      control[3 + axis] = (d0 + 5 * d1) / 8;
      control[6 + axis] = (s0 - s1) / 4;
      control[9 + axis] = (d0 - 3 * d1) / 6;
    }
    this.addPowers(control, edge, weight, from, share, shift);
  }

  /** The same of a biquadratic 3 × 3 net [(3 row + column) · 3 + axis]; across the side its values at the knot are (1, 1)/2. */
  addQuadraticSide(net: Float64Array, side: number, edge: number, weight: number, from: number, share: number, shift: ArrayLike<number>): void {
    const alongRows = side === 0 || side === 2;
    const first = side === 0 || side === 3 ? 0 : 1;
    const powers = [0, 0, 0, 0, 0, 0, 0, 0, 0];
    for (let axis = 0; axis < 3; axis++) {
      const at = (i: number): number => {
        const along = side >= 2 ? 2 - i : i;
        const one = alongRows ? 3 * along + first : 3 * first + along;
        return (net[3 * one + axis] + net[3 * (one + (alongRows ? 1 : 3)) + axis]) / 2;
      };
      const c0 = at(0), c1 = at(1), c2 = at(2);
      powers[axis] = (c0 + 6 * c1 + c2) / 8;
      powers[3 + axis] = (c2 - c0) / 2;
      powers[6 + axis] = (c0 - 2 * c1 + c2) / 2;
    }
    this.addPowers(powers, edge, weight, from, share, shift);
  }

  /** Adds a piece by its powers of t − ½, [power · 3 + axis], degree 4 at most, moved by `shift`. It covers [from, from + share] of the edge. */
  addPowers(powers: number[], edge: number, weight: number, from: number, share: number, shift: ArrayLike<number>): void {
    this.edges.push(edge);
    this.weights.push(weight);
    this.shares.push(share);
    this.doubts.push(0);
    const all = powers.concat(new Array<number>(CURVE_POWERS - powers.length).fill(0));
    for (let axis = 0; axis < 3; axis++) all[axis] += shift[axis];
    this.powers.push(...all);
    if (from === 0) this.ends.set(2 * edge, pointAt(all, -0.5));
    if (from + share === 1) this.ends.set(2 * edge + 1, pointAt(all, 0.5));
  }

  /** Notes by how much a closing one level earlier weighs the pieces from `first` on less. */
  doubtFrom(first: number, doubt: number): void {
    this.doubts.fill(doubt, first);
  }

  /** Adds a piece to the curve of another edge too, if need be the other way round; it covers nothing of that edge's range. */
  addCopy(piece: number, edge: number, reversed: boolean): void {
    this.edges.push(edge);
    this.weights.push(this.weights[piece]);
    this.shares.push(0);
    this.doubts.push(this.doubts[piece]);
    for (let i = CURVE_POWERS * piece; i < CURVE_POWERS * (piece + 1); i++) {
      const odd = Math.floor((i % CURVE_POWERS) / 3) % 2 === 1;
      this.powers.push(reversed && odd ? -this.powers[i] : this.powers[i]);
    }
  }

  /** Adds the straight line from (px, py, pz) to (qx, qy, qz) as the whole of an edge's curve. */
  addLine(px: number, py: number, pz: number, qx: number, qy: number, qz: number, edge: number): void {
    this.edges.push(edge);
    this.weights.push(1);
    this.shares.push(1);
    this.doubts.push(0);
    this.powers.push((px + qx) / 2, (py + qy) / 2, (pz + qz) / 2, qx - px, qy - py, qz - pz, 0, 0, 0, 0, 0, 0, 0, 0, 0);
    this.ends.set(2 * edge, [px, py, pz]);
    this.ends.set(2 * edge + 1, [qx, qy, qz]);
  }
}

function pointAt(powers: number[], t: number): [number, number, number] {
  const at = (axis: number): number => powers[axis] + t * (powers[3 + axis] + t * (powers[6 + axis] + t * (powers[9 + axis] + t * powers[12 + axis])));
  return [at(0), at(1), at(2)];
}
