import type { Vec } from './vector';

/** OpenSubdiv's value of an infinitely sharp edge. */
const SHARP = 10;
const DECIMALS = 4;

export interface DraftFace {
  corners: number[];
  part: string;
}

/** Vertex numbers in order; a ring is closed (the last joins the first), counter-clockwise seen from where it is extruded to. */
export type Ring = number[];

/** A control cage while it is built: vertices, faces with the name of their part, sharp edges. */
export class CageDraft {
  readonly points: Vec[] = [];
  faces: DraftFace[] = [];
  readonly sharpEdges: [number, number][] = [];

  add(point: Vec): number {
    this.points.push(point);
    return this.points.length - 1;
  }

  /** `corners` counter-clockwise seen from outside. */
  face(part: string, ...corners: number[]): void {
    this.faces.push({ corners, part });
  }

  sharpen(a: number, b: number): void {
    this.sharpEdges.push([a, b]);
  }

  sharpenRing(ring: Ring): void {
    ring.forEach((vertex, i) => this.sharpen(vertex, ring[(i + 1) % ring.length]));
  }

  /** Quads between two rings of equal length, from `from` outwards to `to`. */
  band(part: string, from: Ring, to: Ring): void {
    const n = from.length;
    for (let i = 0; i < n; i++) this.face(part, from[i], from[(i + 1) % n], to[(i + 1) % n], to[i]);
  }

  /**
   * Completes a half built at x ≥ 0: every vertex off the middle plane gets its exact mirror image, every face a reversed copy.
   * Parts that end in `_L` become `_R`; others go on across the middle.
   */
  mirror(): void {
    const image = this.points.map((point, i) => (point[0] === 0 ? i : this.add([-point[0], point[1], point[2]])));
    for (const { corners, part } of [...this.faces]) {
      this.face(part.replace(/_L$/, '_R'), ...corners.map((corner) => image[corner]).reverse());
    }
    for (const [a, b] of [...this.sharpEdges]) if (image[a] !== a || image[b] !== b) this.sharpen(image[a], image[b]);
  }

  /** Turns every face of a part over. */
  reversePart(part: string): void {
    for (const face of this.faces) if (face.part === part) face.corners.reverse();
  }

  /** Moves every vertex. */
  reshape(move: (point: Vec) => Vec): void {
    for (let i = 0; i < this.points.length; i++) this.points[i] = move(this.points[i]);
  }

  /** Takes in another draft, its parts as they are named. */
  include(other: CageDraft): void {
    const first = this.points.length;
    this.points.push(...other.points);
    for (const { corners, part } of other.faces) this.face(part, ...corners.map((corner) => corner + first));
    for (const [a, b] of other.sharpEdges) this.sharpen(a + first, b + first);
  }

  /** OBJ text: parts as groups in the order of their first face, sharp edges as tags. Coordinates to a micrometre; vertices without a face are left out. */
  toObj(title: string): string {
    const number = new Map<number, number>();
    const lines = [`# ${title}`, '# centimetres, y up', `o ${title}`];
    for (const vertex of new Set(this.faces.flatMap((face) => face.corners))) {
      number.set(vertex, number.size);
      lines.push(`v ${this.points[vertex].map(decimal).join(' ')}`);
    }
    const numberOf = (vertex: number): number => {
      const found = number.get(vertex);
      if (found === undefined) throw new RangeError(`vertex ${vertex} of ${title} has no face`);
      return found;
    };
    for (const part of new Set(this.faces.map((face) => face.part))) {
      lines.push(`g ${part}`);
      for (const face of this.faces) if (face.part === part) lines.push(`f ${face.corners.map((corner) => numberOf(corner) + 1).join(' ')}`);
    }
    for (const [a, b] of this.sharpEdges) lines.push(`t crease 2/1/0 ${numberOf(a)} ${numberOf(b)} ${SHARP}`);
    return `${lines.join('\n')}\n`;
  }
}

function decimal(value: number): string {
  const text = value.toFixed(DECIMALS).replace(/\.?0+$/, '');
  return text === '-0' ? '0' : text;
}
