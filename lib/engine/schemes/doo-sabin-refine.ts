import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { addBorderCurves } from './doo-sabin-borders';
import { cutOutDooSabin } from './doo-sabin-cut';
import { dooSabinWeight } from './doo-sabin-fan';
import { dooSabinMesh, type DooSabinMesh } from './doo-sabin-mesh';

/** Where the parts of a mesh are found in the refined one. Half-edge numbers unless said; -1 where there is none. */
export interface Offspring {
  /** The half-edges of the faces that are refined, ascending; all others have none of the following. */
  active: Int32Array;
  /** New vertex of each corner. */
  ids: Int32Array;
  /** By border half-edge: the first of its two new vertices, that near its start; the other follows. */
  rimIds: Int32Array;
  /** In the face of the face, by corner. */
  inFace: Int32Array;
  /** In the face of the vertex, by corner. */
  inVertex: Int32Array;
  /** By border half-edge: the side of its start's face that comes back to the first corner. */
  closing: Int32Array;
  /** First half-edge of the edge's quad; by the lower half-edge of two, and by border half-edges. */
  inEdge: Int32Array;
}

/**
 * Refines around the vertices `kept` [Doo & Sabin 1978]: a new vertex for each corner of the faces there, a face for each such face, for each of their edges
 * and for each kept vertex. The border follows the rule that its edges are doubled, as quads with two pairs of equal vertices [Doo 1978]: so an edge of the
 * border gets two new vertices at ¾ and ¼, a border vertex among k faces a (k + 2)-gon, and the limit's border is the quadratic B-spline of the border
 * polygon. A corner that is kept is doubled both ways and gets a quad with itself. New vertices at `waiting` ones of live bodies are live, as those say.
 */
export function refineDooSabin(whole: DooSabinMesh, waiting: Uint8Array, kept: Uint8Array): DooSabinMesh {
  const { mesh, pending, keep } = cutOutDooSabin(whole, waiting, kept);
  const { vertexOf, faceOf, twin, starts } = mesh;
  const halfEdges = vertexOf.length;
  const none = (): Int32Array => new Int32Array(halfEdges).fill(-1);
  const touched = new Uint8Array(mesh.faces);
  for (let h = 0; h < halfEdges; h++) if (keep[vertexOf[h]] === 1) touched[faceOf[h]] = 1;
  const active = new Int32Array(halfEdges);
  let count = 0;
  for (let face = 0; face < mesh.faces; face++) if (touched[face] === 1) for (let h = starts[face]; h < starts[face + 1]; h++) active[count++] = h;
  const at: Offspring = { active: active.subarray(0, count), ids: none(), rimIds: none(), inFace: none(), inVertex: none(), closing: none(), inEdge: none() };
  let vertices = 0;
  let faces = 0;
  let keptCount = 0;
  let sides = 0;
  for (let face = 0; face < mesh.faces; face++) {
    if (touched[face] === 0) continue;
    faces++;
    sides += starts[face + 1] - starts[face];
    for (let h = starts[face]; h < starts[face + 1]; h++) {
      at.ids[h] = vertices++;
      const from = keep[vertexOf[h]];
      keptCount += from;
      if (from === 0 && keep[vertexOf[nextHalfEdge(mesh, h)]] === 0) continue;
      if (twin[h] >= 0 && twin[h] < h) continue;
      faces++;
      sides += 4;
      if (twin[h] < 0) sides += 3;
    }
  }
  const corners = vertices;
  for (const h of at.active) {
    if (twin[h] >= 0 || (keep[vertexOf[h]] === 0 && keep[vertexOf[nextHalfEdge(mesh, h)]] === 0)) continue;
    at.rimIds[h] = vertices;
    vertices += 2;
  }
  const rims = vertices;

  const lay = new Layout(faces + keptCount, sides + keptCount);
  for (let face = 0; face < mesh.faces; face++) {
    if (touched[face] === 0) continue;
    for (let h = starts[face]; h < starts[face + 1]; h++) at.inFace[h] = lay.put(at.ids[h]);
    lay.close();
  }
  const keptCorners: number[] = [];
  for (const h of at.active) {
    if (keep[vertexOf[h]] === 0 || at.inVertex[h] >= 0) continue;
    let first = h;
    for (let t = twin[first]; t >= 0; t = twin[first]) {
      first = nextHalfEdge(mesh, t);
      if (first === h) break;
    }
    let corner = first;
    let last = first;
    do {
      at.inVertex[corner] = lay.put(at.ids[corner]);
      last = corner;
      corner = twin[previousHalfEdge(mesh, corner)];
    } while (corner >= 0 && corner !== first);
    if (corner < 0) {
      lay.put(at.rimIds[previousHalfEdge(mesh, last)] + 1);
      if (mesh.keepsCorners && first === last) {
        lay.put(vertices++);
        keptCorners.push(first);
      }
      at.closing[first] = lay.put(at.rimIds[first]);
    }
    lay.close();
  }
  for (const h of at.active) {
    const t = twin[h];
    if (t >= 0 && t < h) continue;
    const after = nextHalfEdge(mesh, h);
    if (keep[vertexOf[h]] === 0 && keep[vertexOf[after]] === 0) continue;
    if (t < 0) {
      at.inEdge[h] = lay.quad(at.ids[after], at.ids[h], at.rimIds[h], at.rimIds[h] + 1);
      lay.join(at.inEdge[h], at.inFace[h]);
      lay.join(at.inEdge[h] + 1, at.closing[h]);
      lay.join(at.inEdge[h] + 3, at.inVertex[after]);
      continue;
    }
    // Counter-clockwise: beside the far face at both ends, then beside the near one.
    const beyond = nextHalfEdge(mesh, t);
    at.inEdge[h] = lay.quad(at.ids[beyond], at.ids[t], at.ids[after], at.ids[h]);
    lay.join(at.inEdge[h], at.inFace[t]);
    lay.join(at.inEdge[h] + 1, at.inVertex[after]);
    lay.join(at.inEdge[h] + 2, at.inFace[h]);
    lay.join(at.inEdge[h] + 3, at.inVertex[beyond]);
  }
  const laid = lay.finish();
  const fine = dooSabinMesh({
    ...laid, vertices, edgeSharpness: new Float32Array(laid.vertexOf.length), vertexSharpness: new Float32Array(vertices),
    positions: new Float64Array(3 * vertices), bodyOf: new Int32Array(vertices), live: new Uint8Array(vertices), level: mesh.level + 1,
    borderOf: new Int32Array(laid.vertexOf.length).fill(-1), borderFrom: new Float32Array(laid.vertexOf.length),
    keepsCorners: mesh.keepsCorners, rimOf: new Int32Array(rims === corners ? 0 : vertices).fill(-1),
    rimFrom: new Float32Array(rims === corners ? 0 : vertices), rimShare: new Float32Array(rims === corners ? 0 : vertices),
    firstSpoke: mesh.firstSpoke, spokes: mesh.spokes, edgeOf: null,
  });
  placeCorners(mesh, touched, at.ids, pending, fine);
  placeBorder(mesh, at, keptCorners, rims, pending, fine);
  addBorderCurves(mesh, at, keptCorners, rims, fine);
  return fine;
}

/** Half-edge tables while they are laid down face by face. */
class Layout {
  private readonly starts: Int32Array;
  private readonly vertexOf: Int32Array;
  private readonly faceOf: Int32Array;
  private readonly twin: Int32Array;
  private faces = 0;
  private count = 0;

  /** At most so many faces and half-edges. */
  constructor(faces: number, sides: number) {
    this.starts = new Int32Array(faces + 1);
    this.vertexOf = new Int32Array(sides);
    this.faceOf = new Int32Array(sides);
    this.twin = new Int32Array(sides).fill(-1);
  }

  /** Adds a corner to the face that is being laid and returns its half-edge. */
  put(vertex: number): number {
    this.vertexOf[this.count] = vertex;
    this.faceOf[this.count] = this.faces;
    return this.count++;
  }

  close(): void {
    this.starts[++this.faces] = this.count;
  }

  /** Adds a quad and returns its first half-edge. */
  quad(a: number, b: number, c: number, d: number): number {
    const first = this.put(a);
    this.put(b);
    this.put(c);
    this.put(d);
    this.close();
    return first;
  }

  join(a: number, b: number): void {
    if (b < 0) return;
    this.twin[a] = b;
    this.twin[b] = a;
  }

  finish(): { faces: number; starts: Int32Array; vertexOf: Int32Array; faceOf: Int32Array; twin: Int32Array } {
    return {
      faces: this.faces, starts: this.starts.slice(0, this.faces + 1), vertexOf: this.vertexOf.slice(0, this.count),
      faceOf: this.faceOf.slice(0, this.count), twin: this.twin.slice(0, this.count),
    };
  }
}

const weightsOf: Float64Array[] = [];

/** The weights of an n-gon's corners, from that of the new point on. */
function weightsFor(n: number): Float64Array {
  weightsOf[n] ??= Float64Array.from({ length: n }, (_, k) => dooSabinWeight(n, k));
  return weightsOf[n];
}

function placeCorners(mesh: DooSabinMesh, touched: Uint8Array, ids: Int32Array, pending: Uint8Array, fine: DooSabinMesh): void {
  const { starts, vertexOf, positions } = mesh;
  const ofFaces = mesh.level === 0;
  for (let face = 0; face < mesh.faces; face++) {
    if (touched[face] === 0) continue;
    const start = starts[face];
    const n = starts[face + 1] - start;
    const weights = weightsFor(n);
    for (let i = 0; i < n; i++) {
      const vertex = vertexOf[start + i];
      const id = ids[start + i];
      fine.bodyOf[id] = mesh.bodyOf[ofFaces ? face : vertex];
      fine.live[id] = ofFaces && mesh.live[face] !== 1 ? 0 : pending[vertex];
      let x = 0, y = 0, z = 0;
      for (let k = 0; k < n; k++) {
        const from = 3 * vertexOf[start + (i + k < n ? i + k : i + k - n)];
        x += weights[k] * positions[from];
        y += weights[k] * positions[from + 1];
        z += weights[k] * positions[from + 2];
      }
      fine.positions[3 * id] = x;
      fine.positions[3 * id + 1] = y;
      fine.positions[3 * id + 2] = z;
    }
  }
}

/** The new vertices along the border, at ¾ and ¼ of its edges, and the kept corners. */
function placeBorder(mesh: DooSabinMesh, { active, rimIds }: Offspring, keptCorners: number[], firstCorner: number, pending: Uint8Array, fine: DooSabinMesh): void {
  const own = (id: number, vertex: number, face: number): void => {
    fine.bodyOf[id] = mesh.bodyOf[mesh.level === 0 ? face : vertex];
    fine.live[id] = mesh.level === 0 && mesh.live[face] !== 1 ? 0 : pending[vertex];
  };
  for (const h of active) {
    const id = rimIds[h];
    if (id < 0) continue;
    const a = mesh.vertexOf[h];
    const b = mesh.vertexOf[nextHalfEdge(mesh, h)];
    own(id, a, mesh.faceOf[h]);
    own(id + 1, b, mesh.faceOf[h]);
    for (let axis = 0; axis < 3; axis++) {
      const [p, q] = [mesh.positions[3 * a + axis], mesh.positions[3 * b + axis]];
      fine.positions[3 * id + axis] = (3 * p + q) / 4;
      fine.positions[3 * id + 3 + axis] = (p + 3 * q) / 4;
    }
  }
  for (let i = 0; i < keptCorners.length; i++) {
    const vertex = mesh.vertexOf[keptCorners[i]];
    own(firstCorner + i, vertex, mesh.faceOf[keptCorners[i]]);
    for (let axis = 0; axis < 3; axis++) fine.positions[3 * (firstCorner + i) + axis] = mesh.positions[3 * vertex + axis];
  }
}
