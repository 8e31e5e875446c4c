import type { Boundary, Cage } from '@/lib/engine/cage';
import { facesOf } from './engine-cages';

/** A face and the place of an edge's start in it; null where nothing lies across. */
type Across = [number, number] | null;

/**
 * Doo-Sabin refinement by the closed rule alone [Doo & Sabin 1978], from lists and maps, without a line of the engine. An open border is made by putting
 * quads with two pairs of equal vertices outside its edges [Doo 1978], and what belongs to those copies is left out of the surface.
 */
export interface PlainMesh {
  points: number[][];
  faces: number[][];
  /** What lies across each edge of each face. Two vertices may share several edges, so vertices do not tell. */
  across: Across[][];
  /** Per vertex: the part that its patch belongs to; -1 for copies. At level 0 vertices of the cage have 0. */
  labels: number[];
  /** Per face, at level 0 only. */
  faceLabels: number[] | null;
}

/** The cage with its border doubled. */
export function plainCage(cage: Cage, labels: readonly number[], boundary: Boundary): PlainMesh {
  const faces = facesOf(cage);
  const points = Array.from({ length: cage.positions.length / 3 }, (_, v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3)));
  const own = points.map(() => 0);
  const faceLabels = labels.slice();
  const sides = new Set(faces.flatMap((face) => face.map((v, i) => `${v} ${face[(i + 1) % face.length]}`)));
  const facesAt = points.map(() => 0);
  for (const v of faces.flat()) facesAt[v]++;
  const copyOf = new Map<string, number>();
  const copy = (v: number, name: string): number => {
    const key = `${v} ${name}`;
    const known = copyOf.get(key) ?? points.length;
    if (known === points.length) {
      points.push(points[v]);
      own.push(-1);
      copyOf.set(key, known);
    }
    return known;
  };
  const kept = (v: number): boolean => boundary === 'edge-and-corner' && facesAt[v] === 1;
  faces.slice().forEach((face, f) => {
    face.forEach((a, i) => {
      const b = face[(i + 1) % face.length];
      if (sides.has(`${b} ${a}`)) return;
      faces.push([b, a, copy(a, kept(a) ? 'leaving' : ''), copy(b, kept(b) ? 'arriving' : '')]);
      faceLabels.push(labels[f]);
      if (!kept(a)) return;
      faces.push([a, copy(a, 'arriving'), copy(a, 'corner'), copy(a, 'leaving')]);
      faceLabels.push(labels[f]);
    });
  });
  return { points, faces, across: acrossOf(faces), labels: own, faceLabels };
}

/** For each edge of each face the face on its other side and the place of the edge there; null at the border. */
function acrossOf(faces: readonly number[][]): Across[][] {
  const edges = new Map<string, [number, number]>();
  faces.forEach((face, f) => face.forEach((v, i) => edges.set(`${v} ${face[(i + 1) % face.length]}`, [f, i])));
  return faces.map((face) => face.map((v, i) => edges.get(`${face[(i + 1) % face.length]} ${v}`) ?? null));
}

/** Corners (face, place) around each vertex that is all surrounded, counter-clockwise. */
function ringsOf(mesh: PlainMesh): Map<number, [number, number][]> {
  const rings = new Map<number, [number, number][]>();
  mesh.faces.forEach((face, f) => face.forEach((v, i) => {
    if (rings.has(v)) return;
    const ring: [number, number][] = [];
    let at: Across = [f, i];
    do {
      ring.push(at);
      const [g, j]: [number, number] = at;
      const count = mesh.faces[g].length;
      at = mesh.across[g][(j + count - 1) % count];
    } while (at !== null && (at[0] !== f || at[1] !== i));
    if (at !== null) rings.set(v, ring);
  }));
  return rings;
}

export function plainRefine(mesh: PlainMesh): PlainMesh {
  const points: number[][] = [];
  const labels: number[] = [];
  const idOf = mesh.faces.map((face, f) => face.map((v, j) => {
    const n = face.length;
    const sum = [0, 0, 0];
    face.forEach((w, i) => {
      const weight = i === j ? (n + 5) / (4 * n) : (3 + 2 * Math.cos((2 * Math.PI * (i - j)) / n)) / (4 * n);
      mesh.points[w].forEach((value, axis) => (sum[axis] += weight * value));
    });
    labels.push(mesh.labels[v] < 0 ? -1 : (mesh.faceLabels?.[f] ?? mesh.labels[v]));
    return points.push(sum) - 1;
  }));
  const faces = idOf.map((ids) => ids.slice());
  const across: Across[][] = faces.map((face) => face.map(() => null));
  const add = (face: number[]): number => {
    across.push(face.map(() => null));
    return faces.push(face) - 1;
  };
  const join = (a: Across, b: Across): void => {
    if (a === null || b === null) return;
    across[a[0]][a[1]] = b;
    across[b[0]][b[1]] = a;
  };
  // Where each corner stands in the face of its vertex.
  const placeOf: Across[][] = mesh.faces.map((face) => face.map(() => null));
  for (const ring of ringsOf(mesh).values()) {
    const made = add(ring.map(([f, i]) => idOf[f][i]));
    ring.forEach(([f, i], place) => (placeOf[f][i] = [made, place]));
  }
  mesh.faces.forEach((face, f) => face.forEach((_, i) => {
    const other = mesh.across[f][i];
    if (other === null || other[0] < f || (other[0] === f && other[1] < i)) return;
    const [g, j] = other;
    const next = (i + 1) % face.length;
    const beyond = (j + 1) % mesh.faces[g].length;
    const made = add([idOf[g][beyond], idOf[g][j], idOf[f][next], idOf[f][i]]);
    join([made, 0], [g, j]);
    join([made, 1], placeOf[f][next]);
    join([made, 2], [f, i]);
    join([made, 3], placeOf[g][beyond]);
  }));
  return { points, faces, across, labels, faceLabels: null };
}

/** Volume and first moments about the origin, area, and what closes a part with one border. */
export interface PlainPart {
  volume: number;
  area: number;
  /** Mean of the border's curve over its parameter, length, and volume of the cone from the origin over the cap from that mean. */
  borderMean: number[];
  borderLength: number;
  cap: number;
}

function det(a: number[], b: number[], c: number[]): number {
  return a[0] * (b[1] * c[2] - b[2] * c[1]) + a[1] * (b[2] * c[0] - b[0] * c[2]) + a[2] * (b[0] * c[1] - b[1] * c[0]);
}

function triangleArea(a: number[], b: number[], c: number[]): number {
  const [u, v] = [b.map((x, i) => x - a[i]), c.map((x, i) => x - a[i])];
  return Math.hypot(u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]) / 2;
}

/** Parts of the surface made of triangles between the middles of faces, which lie on the limit. From level 1 on. */
export function plainParts(mesh: PlainMesh, parts: number): PlainPart[] {
  const middles = mesh.faces.map((face) => [0, 1, 2].map((axis) => face.reduce((sum, v) => sum + mesh.points[v][axis], 0) / face.length));
  const found = Array.from({ length: parts }, (): PlainPart => ({ volume: 0, area: 0, borderMean: [0, 0, 0], borderLength: 0, cap: 0 }));
  const borders: [number[], number[]][][] = found.map(() => []);
  for (const [v, ring] of ringsOf(mesh)) {
    const label = mesh.labels[v];
    if (label < 0) continue;
    const corners = ring.map(([f]) => middles[f]);
    for (let i = 2; i < corners.length; i++) {
      found[label].volume += det(corners[0], corners[i - 1], corners[i]) / 6;
      found[label].area += triangleArea(corners[0], corners[i - 1], corners[i]);
    }
    ring.forEach(([f, i], j) => {
      // The side between the face before and this one is shared with the end of this face's edge.
      const neighbour = mesh.faces[f][(i + 1) % mesh.faces[f].length];
      if (mesh.labels[neighbour] === label) return;
      borders[label].push([corners[(j + corners.length - 1) % corners.length], corners[j]]);
    });
  }
  found.forEach((part, p) => {
    const count = borders[p].length;
    for (const [a, b] of borders[p]) {
      part.borderLength += Math.hypot(...a.map((x, i) => x - b[i]));
      a.forEach((x, i) => (part.borderMean[i] += (x + b[i]) / 2 / count));
    }
    for (const [a, b] of borders[p]) part.cap += det(part.borderMean, b, a) / 6;
  });
  return found;
}

/** Limit of a sequence whose error falls as h², h⁴, … with h halved from one value to the next. */
export function extrapolated(values: readonly number[]): number {
  let row = values.slice();
  for (let power = 4; row.length > 1; power *= 4) row = row.slice(1).map((value, i) => value + (value - row[i]) / (power - 1));
  return row[0];
}
