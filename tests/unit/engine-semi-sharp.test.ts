import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage, Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions } from '@/lib/engine/measured';
import { refineStrip } from '@/lib/engine/schemes/crease-strip';
import { cageOf, cageSize, CATMULL_CLARK, facesOf, momentError, totalMoments } from '../support/engine-cages';
import { gridBox, type GridBox } from '../support/grid-box';
import { refinedOnce } from '../support/random-cages';

type Crease = [number, number, number];

/** Lattice boxes with moved points, so that nothing in them is symmetric or flat. */
function bumpyBox(): GridBox {
  return gridBox([4, 4, 3], (i, j, k) => [i + 0.2 * Math.sin(3 * j + k), j + 0.2 * Math.sin(5 * k + i), k + 0.2 * Math.sin(7 * i + 2 * j)]);
}

/** Edges of the top (k = 3) along the row j, from column `from` to column `to`. */
function row(box: GridBox, j: number, from: number, to: number, sharpness: number): Crease[] {
  return Array.from({ length: to - from }, (_, i) => [box.vertexAt(from + i, j, 3), box.vertexAt(from + i + 1, j, 3), sharpness]);
}

/** Edges of the top along the column i = 2, from row `from` on. */
function column(box: GridBox, from: number, sharpness: number): Crease[] {
  return Array.from({ length: 4 - from }, (_, j) => [box.vertexAt(2, from + j, 3), box.vertexAt(2, from + j + 1, 3), sharpness]);
}

/** A closed line around the box beside its corners. */
function belt(box: GridBox, sharpness: number): Crease[] {
  const around = [...[0, 1, 2, 3].map((i) => [i, 3]), ...[3, 2, 1].map((k) => [4, k]), ...[4, 3, 2, 1].map((i) => [i, 0]), ...[0, 1, 2].map((k) => [0, k])];
  const vertices = around.map(([i, k]) => box.vertexAt(i, 3, k));
  return vertices.map((v, i) => [v, vertices[(i + 1) % vertices.length], sharpness]);
}

/** Faces of the box sorted by the side of the row j = 2 on which they lie and there by a column, so that borders run along lines, cross them and branch on them. */
function grouped(cage: Cage): Cage {
  const labels = facesOf(cage).map((face) => {
    const middle = (axis: number): number => face.reduce((sum, v) => sum + cage.positions[3 * v + axis], 0) / face.length;
    return middle(1) < 2 ? Number(middle(0) > 3) : 2 + Number(middle(0) < 1);
  });
  return { ...cage, groups: { names: ['a', 'b', 'c', 'd'], labels: Int32Array.from(labels) } };
}

/** The cage after so many refinements of all of it that no semi-sharp edge is left: what local refinement in both directions would come to. */
function worn(cage: Cage, options: MeasureOptions): Cage {
  let fine = cage;
  while ([...fine.creaseSharpness, ...fine.cornerSharpness].some((sharpness) => sharpness > 0 && sharpness < 10)) {
    // A face's children come together: one a corner, and one in the middle of a triangle under Loop.
    const labels = facesOf(fine).flatMap((face, f) => new Array<number>(options.scheme === 'loop' ? 4 : face.length).fill(fine.groups?.labels[f] ?? 0));
    fine = { ...refinedOnce(fine, options), groups: { names: fine.groups?.names ?? [], labels: Int32Array.from(labels) } };
  }
  return fine;
}

const ARRANGEMENTS: Record<string, (box: GridBox, s: number) => Crease[]> = {
  'a line around the box beside its corners': (box, s) => belt(box, s),
  'a line across the top': (box, s) => row(box, 2, 0, 4, s),
  'a line that ends in the middle': (box, s) => row(box, 2, 0, 3, s),
  'two lines beside each other, unequal': (box, s) => [...row(box, 2, 0, 4, s), ...row(box, 1, 0, 4, s / 2)],
  'a line beside one that is sharp for good': (box, s) => [...row(box, 2, 0, 4, s), ...row(box, 1, 0, 4, 10)],
  'two lines that cross': (box, s) => [...row(box, 2, 0, 4, s), ...column(box, 0, s)],
  'a line that ends on another': (box, s) => [...row(box, 2, 0, 4, s), ...column(box, 2, s)],
  'a line whose sharpness changes': (box, s) => [...row(box, 2, 0, 2, s), ...row(box, 2, 2, 4, s / 3)],
};

/** The cage with one vertex of some sharpness. */
function tagged(cage: Cage, vertex: number, sharpness: number): Cage {
  return { ...cage, cornerVertices: Uint32Array.of(vertex), cornerSharpness: Float32Array.of(sharpness) };
}

/** The faces of a scheme: under Loop quads are halved, all from their first corner or all from their second. */
function facesFor(scheme: Scheme, faces: readonly number[][], fromSecond = false): number[][] {
  if (scheme !== 'loop') return faces.map((face) => [...face]);
  return faces.flatMap(([a, b, c, d]) => (fromSecond ? [[b, c, d], [b, d, a]] : [[a, b, c], [a, c, d]]));
}

const SETTINGS = [['catmull-clark', 'uniform'], ['catmull-clark', 'chaikin'], ['loop', 'uniform'], ['loop', 'chaikin']] as const;

describe('faces along a semi-sharp crease', () => {
  for (const [name, creases] of Object.entries(ARRANGEMENTS)) {
    for (const [scheme, creasing] of SETTINGS) {
      it(`${scheme}, ${name}, ${creasing} creasing: as when all is refined until the sharpness is gone, parts and all`, () => {
        // With and without a corner in the middle of the row j = 2.
        for (const [sharpness, corner] of [[0.3, 0], [1, 0], [2.6, 0], [2, 1.4]]) {
          const box = bumpyBox();
          const cage = grouped(tagged(cageOf(box.positions, facesFor(scheme, box.faces, creasing === 'chaikin'), creases(box, sharpness)), box.vertexAt(2, 2, 3), corner));
          const options: MeasureOptions = { ...CATMULL_CLARK, scheme, creasing, partsBy: 'group' };
          const smooth = worn(cage, options);
          const [found, wanted] = [measureCage(cage, options), measureCage(smooth, options)];
          const size = cageSize(cage);
          found.parts.forEach((part, i) => {
            expect(momentError(totalMoments([part]), totalMoments([wanted.parts[i]]), size)).toBeLessThan(1e-14);
            const [a, b] = [part.components[0], wanted.parts[i].components[0]];
            expect(Math.abs(a.surface.area / b.surface.area - 1)).toBeLessThanOrEqual(a.surfaceErrorEstimate + b.surfaceErrorEstimate);
          });
          const [whole, smoothWhole] = [cage, smooth].map((one) => measureCage(one, { ...options, partsBy: 'whole' }).parts);
          expect(momentError(totalMoments(whole), totalMoments(smoothWhole), size)).toBeLessThan(1e-14);
          expect(momentError(totalMoments(found.parts), totalMoments(whole), size)).toBeLessThan(1e-14);
        }
      });
    }
  }

  it('a crease that ends where half as many edges meet as on a regular vertex, 2 of quads and 3 of triangles', () => {
    const box = gridBox([1, 1, 1], (i, j, k) => [i, 1.3 * j, k + 0.2 * i * j]);
    // The top is halved from corner to corner by way of a vertex in its middle.
    const top = box.faces.findIndex((face) => face.every((v) => box.positions[v][2] >= 1));
    const [a, b, c, d] = box.faces[top];
    const middle = box.positions.length;
    const quads = [...box.faces.filter((_, f) => f !== top), [a, b, c, middle], [a, middle, c, d]];
    const below = box.positions.findIndex((p) => p[0] === box.positions[a][0] && p[1] === box.positions[a][1] && p[2] < 1);
    const tetrahedron = [[1, 1, 1], [1, -1, -1], [-1, 1, -1.5], [-1, -1, 1]];
    for (const s of [0.7, 1.7, 2.5]) {
      const cages: [Scheme, Cage][] = [
        ['catmull-clark', cageOf([...box.positions, [0.4, 0.6, 1.5]], quads, [[middle, a, s], [a, below, s]])],
        ['loop', cageOf(tetrahedron, [[0, 1, 2], [0, 2, 3], [0, 3, 1], [1, 3, 2]], [[0, 1, s]])],
      ];
      for (const [scheme, cage] of cages) {
        const options: MeasureOptions = { ...CATMULL_CLARK, scheme };
        const [found, wanted] = [cage, worn(cage, options)].map((one) => totalMoments(measureCage(one, options).parts));
        expect(wanted.volume).not.toBe(0);
        expect(momentError(found, wanted, cageSize(cage))).toBeLessThan(1e-14);
      }
    }
  });

  it('an open plate with lines as borders of parts: as when all is refined until the sharpness is gone', () => {
    const n = 5;
    const positions = Array.from({ length: (n + 1) ** 2 }, (_, v) => [v % (n + 1), Math.floor(v / (n + 1)), 2 + Math.sin(1.3 * v) / 3]);
    const faces = Array.from({ length: n * n }, (_, f) => Math.floor(f / n) * (n + 1) + (f % n)).map((v) => [v, v + 1, v + n + 2, v + n + 1]);
    for (const boundary of ['edge-only', 'edge-and-corner'] as const) {
      for (const line of [1, 2]) {
        const creases = Array.from({ length: n }, (_, i): Crease => [line * (n + 1) + i, line * (n + 1) + i + 1, 2.3]);
        const names = ['near', 'far'];
        const labels = Int32Array.from(faces, (face) => (face[0] < line * (n + 1) ? 0 : 1));
        const cage: Cage = { ...cageOf(positions, faces, creases), groups: { names, labels } };
        const options: MeasureOptions = { ...CATMULL_CLARK, boundary, partsBy: 'group' };
        const [found, wanted] = [measureCage(cage, options), measureCage(worn(cage, options), options)];
        found.parts.forEach((part, i) => {
          const [a, b] = [totalMoments([part]), totalMoments([wanted.parts[i]])];
          expect(Math.abs(a.volume - b.volume) / cageSize(cage) ** 3).toBeLessThan(1e-15);
          a.second.forEach((value, k) => expect(Math.abs(value - b.second[k]) / cageSize(cage) ** 5).toBeLessThan(1e-15));
          expect(Math.abs(part.components[0].surface.area / wanted.parts[i].components[0].surface.area - 1)).toBeLessThan(1e-11);
        });
      }
    }
  });
});

/** One step of the closed curve's rules [DeRose, Kass & Truong 1998]: a vertex with sharpness s stays put by min(s, 1) and is smoothed by the rest. */
function refinedPolygon(points: number[][], sharpness: number[]): { points: number[][]; sharpness: number[] } {
  const n = points.length;
  const fine = points.flatMap((p, i) => {
    const [before, after] = [points[(i + n - 1) % n], points[(i + 1) % n]];
    const stay = Math.min(1, sharpness[i]);
    return [p.map((x, axis) => stay * x + (1 - stay) * ((before[axis] + 6 * x + after[axis]) / 8)), p.map((x, axis) => (x + after[axis]) / 2)];
  });
  return { points: fine, sharpness: sharpness.flatMap((s) => [Math.max(0, s - 1), 0]) };
}

/**
 * Area inside the closed uniform cubic B-spline of a control polygon: ½ Σ_k g(k) Σ_i P_i × P_{i+k}, g(k) = ∫ B(t) B′(t − k) dt, which is the derivative of the
 * B-spline of degree 7 at k: 245/720, 56/720, 1/720 for k = 1, 2, 3 (de Boor's recurrence, worked out by hand; their moments sum to ½).
 */
function splineArea(points: number[][]): number {
  const n = points.length;
  return [245, 56, 1].reduce((area, weight, j) => area + (weight / 720) * points.reduce((sum, p, i) => {
    const q = points[(i + j + 1) % n];
    return sum + p[0] * q[1] - p[1] * q[0];
  }, 0), 0);
}

describe('a straight tube with semi-sharp edges along it', () => {
  for (const [scheme, s] of [0.1, 0.5, 1, 1.9, 3.3, 5, 7.25, 9.9].flatMap((sharpness) => [['catmull-clark', sharpness] as const, ['loop', sharpness] as const])) {
    it(`holds the area inside its section's curve times its length, ${scheme}, sharpness ${s}`, () => {
      // Between k = 3 and k = 5 the ends have no say, so the surface is a cylinder over the section's curve, cut square.
      // Loop's rules on such a lattice are (1, 6, 1)/8 and (1, 1)/2 around the tube too: of the six neighbours two are the vertex itself, moved along.
      const box = gridBox([2, 3, 8], (i, j, k) => [i * (1 + 0.1 * j), j * (1 - 0.15 * i), k]);
      const ring = [[0, 0], [1, 0], [2, 0], [2, 1], [2, 2], [2, 3], [1, 3], [0, 3], [0, 2], [0, 1]];
      const edges = ring.map(([i, j]) => ((i === 0 || i === 2) && (j === 0 || j === 3) ? s : i === 1 && j === 0 ? s / 3 : 0));
      const creases = ring.flatMap(([i, j], v) => Array.from({ length: 8 }, (_, k): Crease => [box.vertexAt(i, j, k), box.vertexAt(i, j, k + 1), edges[v]]));
      // Quads on the sides begin at their lower left corner, so that under Loop all diagonals climb the same way round and six edges meet in each vertex.
      const upright = box.faces.map((face) => {
        const z = face.map((v) => box.positions[v][2]);
        const first = z.findIndex((height, i) => height === Math.min(...z) && z[(i + 1) % 4] === height);
        return [...face.slice(first), ...face.slice(0, first)];
      });
      const faces = facesFor(scheme, upright);
      const labels = Int32Array.from(faces, (face) => (face.every((v) => box.positions[v][2] >= 3 && box.positions[v][2] <= 5) ? 0 : 1));
      const cage: Cage = { ...cageOf(box.positions, faces, creases), groups: { names: ['middle', 'ends'], labels } };
      let curve = { points: ring.map(([i, j]) => [i * (1 + 0.1 * j), j * (1 - 0.15 * i)]), sharpness: edges.map(Math.fround) };
      while (curve.sharpness.some((left) => left > 0)) curve = refinedPolygon(curve.points, curve.sharpness);
      const area = splineArea(curve.points);
      const { parts } = measureCage(cage, { ...CATMULL_CLARK, scheme, partsBy: 'group' });
      const middle = parts[labels[0] === 0 ? 0 : 1].components[0];
      expect(Math.abs(middle.solid.volume / (2 * area) - 1)).toBeLessThan(1e-14);
      expect(Math.abs(middle.solid.centroid[2] - 4)).toBeLessThan(1e-14);
      // About the centroid ∫ z² = A ℓ³ / 12, and nothing leans.
      expect(Math.abs(middle.solid.centralSecond[2] / (2 * area / 3) - 1)).toBeLessThan(1e-14);
      expect(Math.abs(middle.solid.centralSecond[4])).toBeLessThan(1e-13);
    });
  }
});

describe('refineStrip', () => {
  const net = Float64Array.from({ length: 48 }, (_, i) => Math.sin(i));
  const anySharpness = fc.double({ min: 0, max: 9.9, noNaN: true }).map(Math.fround);

  it('covers the face once, by no more pieces than the sharpnesses have steps', () => {
    fc.assert(fc.property(anySharpness, anySharpness, (near, far) => {
      const pieces: [number, number][] = [];
      refineStrip(net, near, far, 'uniform', (_, from, share) => pieces.push([from, share]));
      let at = 0;
      for (const [from, share] of pieces) {
        expect(from).toBe(at);
        at += share;
      }
      expect(at).toBe(1);
      expect(pieces.length).toBeLessThanOrEqual(1 + Math.ceil(near) + Math.ceil(far));
    }));
  });
});
