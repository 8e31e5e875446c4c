import { growingFloat64, growingUint32 } from './growing-array';
import type { SkinWeights } from './label-by-joint';
import { LineCursor } from './line-cursor';
import { MeshError } from './mesh-error';
import { MESH_LIMITS, MOST_LINE_BYTES } from './mesh-limits';
import { decodeText } from './text-encoding';
import { TextLines } from './text-lines';

const COLUMNS = ['vertex', 'joint', 'weight'];
const MOST_ROWS = 64_000_000;

/** Name of the file that carries the skin weights of an OBJ beside it: `ox.weights.csv` for `ox.obj`. */
export function weightsName(name: string): string {
  return `${name.slice(name.lastIndexOf('/') + 1).replace(/\.[^.]*$/, '')}.weights.csv`;
}

interface Cell {
  text: string;
  /** Offset in the line. */
  at: number;
}

/** Cells of one line: commas part them, quotation marks hold commas, doubled ones stand for one [RFC 4180]. */
function cellsOf(line: string): Cell[] {
  const cells: Cell[] = [];
  for (let at = 0; at <= line.length; ) {
    const quoted = /"((?:[^"]|"")*)"/y;
    quoted.lastIndex = at;
    const found = quoted.exec(line);
    const end = line.indexOf(',', found ? quoted.lastIndex : at);
    const stop = end < 0 ? line.length : end;
    cells.push({ text: found ? found[1].replaceAll('""', '"') : line.slice(at, stop).trim(), at });
    at = stop + 1;
  }
  return cells;
}

/** Collects rows `vertex,joint,weight`. */
class WeightRows {
  private columns: number[] | null = null;
  private readonly vertices = growingUint32();
  private readonly joints = growingUint32();
  private readonly weights = growingFloat64();
  private readonly numberOf = new Map<string, number>();
  private readonly cursor = new LineCursor();

  constructor(private readonly vertexCount: number) {}

  read(bytes: Uint8Array, start: number, end: number, line: number): void {
    this.cursor.open(bytes, start, end, line, null);
    const text = decodeText(bytes.subarray(start, end));
    if (text.trim() === '') return;
    const cells = cellsOf(text);
    if (this.columns === null) this.columns = this.header(cells, start);
    else this.row(cells, this.columns, start);
  }

  private header(cells: Cell[], start: number): number[] {
    return COLUMNS.map((column) => {
      const index = cells.findIndex((cell) => cell.text.toLowerCase() === column);
      if (index < 0) throw this.cursor.fail('bad_header', `a column "${column}" in the first line`, start);
      return index;
    });
  }

  private row(cells: Cell[], columns: number[], start: number): void {
    const [vertex, joint, weight] = columns.map((column) => cells[column] ?? { text: '', at: cells.at(-1)!.at });
    const number = Number(vertex.text);
    const at = (cell: Cell) => start + cell.at;
    if (vertex.text === '' || !Number.isInteger(number) || number < 1 || number > this.vertexCount) throw this.cursor.fail('vertex_out_of_range', `a vertex number from 1 to ${this.vertexCount}`, at(vertex));
    if (joint.text === '' || joint.text.length > MESH_LIMITS.nameLength) throw this.cursor.fail('bad_name', `the name of a joint, at most ${MESH_LIMITS.nameLength} characters`, at(joint));
    const share = Number(weight.text);
    if (weight.text === '' || !(share >= 0 && share < Infinity)) throw this.cursor.fail('bad_number', 'a weight of 0 or more', at(weight));
    if (this.weights.length >= MOST_ROWS) throw this.cursor.fail('too_large', `at most ${MOST_ROWS} rows`, start);
    let known = this.numberOf.get(joint.text);
    if (known === undefined) {
      known = this.numberOf.size;
      if (known >= MESH_LIMITS.names) throw this.cursor.fail('too_many_names', `at most ${MESH_LIMITS.names} joints`, at(joint));
      this.numberOf.set(joint.text, known);
    }
    this.vertices.push(number - 1);
    this.joints.push(known);
    this.weights.push(share);
  }

  /** The rows sorted by vertex. */
  take(): SkinWeights {
    const [vertices, joints, weights] = [this.vertices.take(), this.joints.take(), this.weights.take()];
    const rows = vertices.length;
    const starts = new Uint32Array(this.vertexCount + 1);
    for (let i = 0; i < rows; i++) starts[vertices[i] + 1]++;
    for (let v = 0; v < this.vertexCount; v++) starts[v + 1] += starts[v];
    const next = starts.slice();
    const skin = { starts, joints: new Uint32Array(rows), weights: new Float64Array(rows), names: [...this.numberOf.keys()] };
    for (let i = 0; i < rows; i++) {
      const at = next[vertices[i]]++;
      skin.joints[at] = joints[i];
      skin.weights[at] = weights[i];
    }
    return skin;
  }
}

/**
 * Reads the skin weights of a mesh of so many vertices from a CSV with the columns vertex (numbered from 1, as an OBJ does), joint and weight, one row for each pair
 * that has a weight. Errors: MeshError with line and column.
 */
export function readJointWeights(bytes: Uint8Array, vertices: number): SkinWeights {
  const rows = new WeightRows(vertices);
  const lines = new TextLines((line, start, end, number) => rows.read(line, start, end, number), MOST_LINE_BYTES);
  lines.push(bytes);
  lines.end();
  const skin = rows.take();
  if (skin.names.length === 0) throw new MeshError({ code: 'empty_file', detail: 'expected rows of vertex, joint and weight, found none' });
  return skin;
}
