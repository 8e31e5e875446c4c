import { FaceLabeller } from './face-labeller';
import { growingFloat64, growingUint32 } from './growing-array';
import { LineCursor } from './line-cursor';
import { MAX_COORDINATE, MESH_LIMITS, MOST_LINE_BYTES } from './mesh-limits';
import type { StlTriangles } from './stl';
import { TextLines } from './text-lines';

const WITHOUT_EFFECT = new Set(['facet', 'endfacet', 'outer', 'endsolid']);
const AXES = ['x', 'y', 'z'];

/** Reads the vertices of a text STL loop by loop; the words around them are only read over, and each loop has to have three. */
class StlTextReader {
  private readonly cursor = new LineCursor();
  private readonly positions = growingFloat64();
  private readonly lines = growingUint32();
  private readonly solids = new FaceLabeller();
  /** Vertices of the loop so far; -1 outside a loop. */
  private corners = -1;
  private loopLine = 0;
  /** Between solid and endsolid: a file that ends there was cut off. */
  private isOpen = false;

  read(bytes: Uint8Array): StlTriangles {
    const text = new TextLines((line, start, end, number, joints) => {
      this.cursor.open(line, start, end, number, joints);
      this.readLine();
    }, MOST_LINE_BYTES);
    text.push(bytes);
    text.end();
    if (this.corners >= 0 || this.isOpen) throw this.cursor.fail('truncated', `${this.corners >= 0 ? 'endloop' : 'endsolid'} before the end of the file`, this.cursor.end);
    return { positions: this.positions.take(), solids: this.solids.take(this.lines.length), lines: this.lines.take() };
  }

  private readLine(): void {
    const { cursor } = this;
    while (cursor.nextWord()) {
      const at = cursor.at;
      const word = cursor.word().toLowerCase();
      if (word === 'vertex') this.readVertex(at);
      else if (word === 'loop') this.openLoop(at);
      else if (word === 'endloop') this.closeLoop(at);
      else if (word === 'solid') this.openSolid(at);
      else if (WITHOUT_EFFECT.has(word)) {
        // What follows these words is a name or a normal, but for "outer loop".
        if (word !== 'outer' && word !== 'endfacet') cursor.at = cursor.end;
        if (word === 'endsolid') this.isOpen = false;
      } else throw cursor.fail('bad_keyword', 'solid, facet, outer loop, vertex, endloop, endfacet or endsolid', at);
    }
  }

  private openSolid(at: number): void {
    this.isOpen = true;
    const name = this.cursor.rest();
    const { names, nameLength } = MESH_LIMITS;
    if (name.length > nameLength) throw this.cursor.fail('name_too_long', `a name of at most ${nameLength} characters`, at);
    if (this.solids.count > names) throw this.cursor.fail('too_many_names', `at most ${names} names`, at);
    this.solids.set(name === '' ? null : name, this.lines.length);
  }

  private openLoop(at: number): void {
    if (this.corners >= 0) throw this.cursor.fail('bad_keyword', 'endloop before the next loop', at);
    this.corners = 0;
    this.loopLine = this.cursor.line;
  }

  private closeLoop(at: number): void {
    if (this.corners !== 3) throw this.cursor.fail('bad_loop', 'a loop of three vertices before endloop', at);
    if (this.lines.length >= MESH_LIMITS.faces) throw this.cursor.fail('too_many_faces', `at most ${MESH_LIMITS.faces} triangles`, at);
    this.corners = -1;
    this.lines.push(this.loopLine);
  }

  private readVertex(keyword: number): void {
    const { cursor } = this;
    if (this.corners < 0 || this.corners === 3) throw cursor.fail('bad_loop', this.corners < 0 ? 'outer loop before a vertex' : 'endloop behind three vertices', keyword);
    this.corners++;
    for (const axis of AXES) {
      const expected = `a number for ${axis}`;
      if (!cursor.nextWord()) throw cursor.fail('missing_coordinate', expected);
      const at = cursor.at;
      const value = cursor.number(expected);
      if (value > MAX_COORDINATE || value < -MAX_COORDINATE) throw cursor.fail('number_too_large', `${expected} between −1e50 and 1e50`, at);
      this.positions.push(value);
    }
  }
}

/** Reads the text form of STL. Errors: MeshError with line and column. */
export function readStlText(bytes: Uint8Array): StlTriangles {
  return new StlTextReader().read(bytes);
}
