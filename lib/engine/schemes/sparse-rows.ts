/** A sparse matrix: row i has the factors [starts[i], starts[i + 1]) at `columns`. */
export interface SparseRows {
  rows: number;
  starts: Int32Array;
  columns: Int32Array;
  factors: Float64Array;
}

/** Rows under construction. */
export class RowBuilder {
  private readonly columns: number[][];
  private readonly factors: number[][];

  constructor(count: number) {
    this.columns = Array.from({ length: count }, () => []);
    this.factors = Array.from({ length: count }, () => []);
  }

  /** Notes x, y, z at `values[at]` as a row's factors of three columns. */
  note(row: number, firstColumn: number, values: ArrayLike<number>, at: number): void {
    for (let axis = 0; axis < 3; axis++) {
      if (values[at + axis] === 0) continue;
      this.columns[row].push(firstColumn + axis);
      this.factors[row].push(values[at + axis]);
    }
  }

  /** Sets a row by its factors of all columns. */
  set(row: number, factors: readonly number[]): void {
    factors.forEach((factor, column) => {
      if (factor === 0) return;
      this.columns[row].push(column);
      this.factors[row].push(factor);
    });
  }

  /** A row as text: equal rows have equal text. */
  key(row: number): string {
    return `${this.columns[row].join()}|${this.factors[row].join()}`;
  }

  /** The rows with these numbers, in this order. */
  finish(rows: readonly number[]): SparseRows {
    const columns: number[] = [];
    const factors: number[] = [];
    const starts = [0];
    for (const row of rows) {
      for (const column of this.columns[row]) columns.push(column);
      for (const factor of this.factors[row]) factors.push(factor);
      starts.push(columns.length);
    }
    return { rows: rows.length, starts: Int32Array.from(starts), columns: Int32Array.from(columns), factors: Float64Array.from(factors) };
  }
}

/** Applies a matrix to points (x, y, z each) from `from` on in `source`; its rows go to `target` from `to` on. */
export function applyRows(matrix: SparseRows, source: Float64Array, from: number, target: Float64Array, to: number): void {
  const { rows, starts, columns, factors } = matrix;
  for (let row = 0, at = to; row < rows; row++, at += 3) {
    let x = 0, y = 0, z = 0;
    const end = starts[row + 1];
    for (let i = starts[row]; i < end; i++) {
      const factor = factors[i];
      const point = from + 3 * columns[i];
      x += factor * source[point];
      y += factor * source[point + 1];
      z += factor * source[point + 2];
    }
    target[at] = x;
    target[at + 1] = y;
    target[at + 2] = z;
  }
}
