import type { Boundary } from '../engine/cage';
import { growingFloat32, growingUint32 } from './growing-array';
import type { LineCursor } from './line-cursor';
import { outOfRange, VertexReferences } from './vertex-references';
import type { WarningList } from './warning-list';

/** Tags that change nothing that is measured: they act on texture coordinates only. */
const FACE_VARYING = new Set(['facevaryinginterpolateboundary', 'facevaryingpropagatecorners']);

/** How many whole numbers and decimals follow, and where that was said. */
interface TagCounts {
  ints: number;
  floats: number;
  at: number;
}

/**
 * The sharpness tags of an OBJ file, as the shapes of OpenSubdiv's regression suite carry them:
 * `t name ints/floats/strings …`, vertex indices from 0, `interpolateboundary` 0 none, 1 edge and corner, 2 edge only.
 */
export class ObjTags {
  readonly creaseVertices = growingUint32();
  readonly creaseSharpness = growingFloat32();
  readonly cornerVertices = growingUint32();
  readonly cornerSharpness = growingFloat32();
  readonly references = new VertexReferences(0);
  boundary: Boundary | null = null;

  constructor(private readonly warnings: WarningList) {}

  /** Reads the line behind `t`. `vertices` is the number of vertices so far. Errors: bad_tag, vertex_out_of_range and those of numbers. */
  read(cursor: LineCursor, vertices: number): void {
    if (!cursor.nextWord()) throw cursor.fail('bad_tag', 'a tag name such as crease, corner or interpolateboundary');
    const at = cursor.at;
    const name = cursor.word();
    if (FACE_VARYING.has(name)) return;
    if (name !== 'crease' && name !== 'corner' && name !== 'interpolateboundary') {
      const what = name === 'hole' ? 'a hole tag: its faces are measured like the others' : `the tag ${name}`;
      this.warnings.add(`tag_${name}`, 'tag_ignored', `Left out ${what}.`, cursor.place(at));
      return;
    }
    const counts = this.counts(cursor);
    if (name === 'interpolateboundary') this.readBoundary(cursor, counts.ints);
    else if (name === 'crease') this.readCrease(cursor, counts, vertices);
    else this.readCorner(cursor, counts, vertices);
  }

  private counts(cursor: LineCursor): TagCounts {
    if (!cursor.nextWord()) throw cursor.fail('bad_tag', 'argument counts such as 2/1/0');
    const at = cursor.at;
    const match = /^(\d{1,7})\/(\d{1,7})\/(\d{1,7})$/.exec(cursor.word());
    if (!match) throw cursor.fail('bad_tag', 'argument counts such as 2/1/0', at);
    return { ints: Number(match[1]), floats: Number(match[2]), at };
  }

  private readBoundary(cursor: LineCursor, ints: number): void {
    const expected = '0 (none), 1 (edge and corner) or 2 (edge only)';
    if (ints < 1 || !cursor.nextWord()) throw cursor.fail('bad_tag', expected);
    const at = cursor.at;
    const rule = cursor.integer(0);
    if (rule === 0) {
      this.boundary = null;
      this.warnings.add('boundary_none', 'boundary_none', 'The file asks to leave out faces at open borders; they are measured.', cursor.place(at));
    } else if (rule === 1) this.boundary = 'edge-and-corner';
    else if (rule === 2) this.boundary = 'edge-only';
    else throw cursor.fail('bad_tag', expected, at);
  }

  /** A chain of n vertices tags n − 1 edges, with one sharpness for all or one for each. */
  private readCrease(cursor: LineCursor, { ints, floats, at }: TagCounts, vertices: number): void {
    if (ints < 2 || (floats !== 1 && floats !== ints - 1)) {
      throw cursor.fail('bad_tag', 'a crease of at least two vertices with one sharpness, or one for each edge (counts such as 2/1/0)', at);
    }
    const chain = Array.from({ length: ints }, () => this.vertex(cursor, vertices));
    let sharpness = 0;
    for (let i = 1; i < ints; i++) {
      if (i <= floats) sharpness = this.sharpness(cursor);
      this.creaseVertices.push(chain[i - 1]);
      this.creaseVertices.push(chain[i]);
      this.creaseSharpness.push(sharpness);
    }
  }

  private readCorner(cursor: LineCursor, { ints, floats, at }: TagCounts, vertices: number): void {
    if (ints < 1 || (floats !== 1 && floats !== ints)) {
      throw cursor.fail('bad_tag', 'at least one corner vertex with one sharpness, or one for each (counts such as 1/1/0)', at);
    }
    const corners = Array.from({ length: ints }, () => this.vertex(cursor, vertices));
    let sharpness = 0;
    for (let i = 0; i < ints; i++) {
      if (i < floats) sharpness = this.sharpness(cursor);
      this.cornerVertices.push(corners[i]);
      this.cornerSharpness.push(sharpness);
    }
  }

  private vertex(cursor: LineCursor, vertices: number): number {
    const expected = 'a vertex index from 0';
    if (!cursor.nextWord()) throw cursor.fail('bad_tag', expected);
    const at = cursor.at;
    const index = cursor.integer(0);
    if (index === null) throw cursor.fail('bad_tag', expected, at);
    if (index < 0) throw outOfRange(index, vertices, 0, cursor.place(at));
    if (index >= vertices) this.references.await(index, cursor, at);
    return index;
  }

  private sharpness(cursor: LineCursor): number {
    const expected = 'a sharpness of 0 or more';
    if (!cursor.nextWord()) throw cursor.fail('bad_tag', expected);
    const at = cursor.at;
    const value = cursor.number(expected);
    if (value < 0 || value > 3.4e38) throw cursor.fail('bad_tag', expected, at);
    return value;
  }
}
