import { growingUint32 } from './growing-array';
import type { LineCursor } from './line-cursor';
import { MeshError, type TextPlace } from './mesh-error';

const TEXTS_KEPT = 32;

/**
 * Vertices may be named before the file brings them, so a reference beyond the vertices so far is judged at the file's end.
 * Kept are only references higher than all kept before: if any reference is wrong, the first wrong one in the file is among them.
 */
export class VertexReferences {
  private readonly numbers = growingUint32();
  private readonly lines = growingUint32();
  private readonly columns = growingUint32();
  private readonly texts: string[] = [];
  private highest = -1;

  /** `base` is the number of the file's first vertex in the notation used: 1 in faces, 0 in sharpness tags. */
  constructor(private readonly base: 0 | 1) {}

  /** Remembers a reference to vertex `index` (from 0) that is not there yet. */
  await(index: number, cursor: LineCursor, at: number): void {
    if (index <= this.highest) return;
    this.highest = index;
    const place = cursor.place(at);
    this.numbers.push(index);
    this.lines.push(place.line);
    this.columns.push(place.column);
    if (this.texts.length < TEXTS_KEPT) this.texts.push(place.text);
  }

  /** Throws for the first reference beyond the file's vertices. */
  settle(vertices: number): void {
    if (this.highest < vertices) return;
    const numbers = this.numbers.take();
    const first = numbers.findIndex((index) => index >= vertices);
    const place = { line: this.lines.take()[first], column: this.columns.take()[first], text: this.texts[first] ?? '' };
    throw outOfRange(numbers[first] + this.base, vertices, this.base, place);
  }
}

/** The error of a vertex number outside the file's vertices, with the numbers that would have been right. */
export function outOfRange(found: number, vertices: number, base: 0 | 1, place: TextPlace): MeshError {
  const expected =
    vertices === 0
      ? 'a vertex of this file (it has none so far)'
      : base === 1
        ? `a vertex number from 1 to ${vertices} or −1 to −${vertices}`
        : `a vertex index from 0 to ${vertices - 1} (tags count from 0)`;
  return new MeshError({ code: 'vertex_out_of_range', expected, found: String(found), detail: `expected ${expected}, found ${found}`, place });
}
