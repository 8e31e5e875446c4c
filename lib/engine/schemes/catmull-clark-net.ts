import { isSharpForGood, type LevelMesh } from './level-mesh';

/** Index of net entry (row, column), times 3. */
function entry(row: number, column: number): number {
  return 3 * (4 * row + column);
}

/** Row and column of the quad's four corners, and the step outwards across each of its four sides. */
const CORNER_ROW = [1, 2, 2, 1];
const CORNER_COLUMN = [1, 1, 2, 2];
const OUT_ROW = [0, 1, 0, -1];
const OUT_COLUMN = [-1, 0, 1, 0];

function turn(mesh: LevelMesh, h: number, steps: number): number {
  const start = mesh.starts[mesh.faceOf[h]];
  return start + ((h - start + steps) & 3);
}

function put(mesh: LevelMesh, net: Float64Array, at: number, vertex: number): void {
  net[at] = mesh.positions[3 * vertex];
  net[at + 1] = mesh.positions[3 * vertex + 1];
  net[at + 2] = mesh.positions[3 * vertex + 2];
}

function extrapolate(net: Float64Array, to: number, edge: number, inner: number): void {
  for (let axis = 0; axis < 3; axis++) net[to + axis] = 2 * net[edge + axis] - net[inner + axis];
}

/**
 * Fills the 4 × 4 net of the quad whose corner 0 is half-edge `first`: corners 0 … 3 stand at (1,1), (2,1), (2,2), (1,2).
 * Across creases and borders stand the phantom points 2a − b. With `fan` the net is that of a sector whose corner 0 is extraordinary:
 * sides 0 and 3 and what hangs on them are left alone.
 */
export function fillNet(mesh: LevelMesh, first: number, fan: boolean, net: Float64Array): void {
  for (let i = 0; i < 4; i++) put(mesh, net, entry(CORNER_ROW[i], CORNER_COLUMN[i]), mesh.vertexOf[turn(mesh, first, i)]);
  const from = fan ? 1 : 0;
  const to = fan ? 3 : 4;
  let sharpSides = 0;
  for (let i = from; i < to; i++) {
    const h = turn(mesh, first, i);
    if (isSharpForGood(mesh, h)) {
      sharpSides |= 1 << i;
      continue;
    }
    const twin = mesh.twin[h];
    const j = (i + 1) & 3;
    put(mesh, net, entry(CORNER_ROW[i] + OUT_ROW[i], CORNER_COLUMN[i] + OUT_COLUMN[i]), mesh.vertexOf[turn(mesh, twin, 2)]);
    put(mesh, net, entry(CORNER_ROW[j] + OUT_ROW[i], CORNER_COLUMN[j] + OUT_COLUMN[i]), mesh.vertexOf[turn(mesh, twin, 3)]);
    // The face across the corner between side i and side i + 1, reached over the edge that side i's neighbour has there.
    if ((!fan || i === 1) && !isSharpForGood(mesh, turn(mesh, first, i + 1))) {
      const across = mesh.twin[turn(mesh, twin, 3)];
      put(mesh, net, entry(CORNER_ROW[j] + OUT_ROW[i] + OUT_ROW[j], CORNER_COLUMN[j] + OUT_COLUMN[i] + OUT_COLUMN[j]), mesh.vertexOf[turn(mesh, across, 2)]);
    }
  }
  if (sharpSides === 0) return;
  // Columns (sides 0 and 2) first, then whole rows (sides 1 and 3): the second pass fills the corners between two creases.
  for (let i = 0; i < 4; i += 2) {
    if ((sharpSides & (1 << i)) === 0) continue;
    const column = i === 0 ? 0 : 3;
    const step = i === 0 ? 1 : -1;
    for (let row = 0; row < 4; row++) extrapolate(net, entry(row, column), entry(row, column + step), entry(row, column + 2 * step));
  }
  for (let i = 1; i < 4; i += 2) {
    if ((sharpSides & (1 << i)) === 0) continue;
    const row = i === 1 ? 3 : 0;
    const step = i === 1 ? -1 : 1;
    for (let column = 0; column < 4; column++) extrapolate(net, entry(row, column), entry(row + step, column), entry(row + 2 * step, column));
  }
}

/** Places of the four corners, or of the points that lie outwards of corner i across the sides i + `sides`, in a net whose values stand two apart. */
function placesAt(...sides: number[]): readonly number[] {
  return [0, 1, 2, 3].map((i) => {
    const out = sides.map((side) => (i + side) & 3);
    return 2 * entry(out.reduce((row, side) => row + OUT_ROW[side], CORNER_ROW[i]), out.reduce((column, side) => column + OUT_COLUMN[side], CORNER_COLUMN[i]));
  });
}

const AT_CORNER = placesAt();
const AT_SIDE = placesAt(0);
const AT_SIDE_BEFORE = placesAt(3);
const AT_DIAGONAL = placesAt(0, 3);

/**
 * Writes the same net for a face whose corners are all inner regular vertices among quads, nothing sharp: from `at` on, values two apart, as the kernels
 * have them.
 */
export function fillInnerNet(mesh: LevelMesh, face: number, out: Float64Array, at: number): void {
  const { starts, faceOf, vertexOf, twin, positions } = mesh;
  const first = starts[face];
  for (let i = 0; i < 4; i++) {
    // Across side i lies a quad, and across that one's side at corner i the quad that meets this one in the corner.
    const t = twin[first + i];
    const start = starts[faceOf[t]];
    const across = twin[start + ((t - start + 1) & 3)];
    const far = starts[faceOf[across]];
    write(positions, vertexOf[first + i], out, at + AT_CORNER[i]);
    write(positions, vertexOf[start + ((t - start + 2) & 3)], out, at + AT_SIDE[i]);
    write(positions, vertexOf[far + ((across - far + 2) & 3)], out, at + AT_SIDE_BEFORE[i]);
    write(positions, vertexOf[far + ((across - far + 3) & 3)], out, at + AT_DIAGONAL[i]);
  }
}

function write(positions: Float64Array, vertex: number, out: Float64Array, at: number): void {
  out[at] = positions[3 * vertex];
  out[at + 2] = positions[3 * vertex + 1];
  out[at + 4] = positions[3 * vertex + 2];
}
