import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BOUNDARIES, type Boundary, type Cage } from '@/lib/engine/cage';
import { limitConeMoments } from '@/lib/engine/cone-moments';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions } from '@/lib/engine/measured';
import { findBorders } from '@/lib/engine/mesh/border-loops';
import { makeFrames } from '@/lib/engine/mesh/frames';
import { partitionFaces } from '@/lib/engine/mesh/partition';
import { buildTopology } from '@/lib/engine/mesh/topology';
import { integrateLimit } from '@/lib/engine/moments/integrate-limit';
import { cageOf, cageSize, CATMULL_CLARK, facesOf, momentError, moved, referenceCage, totalMoments } from '../support/engine-cages';
import { extrapolated, plainCage, plainParts, plainRefine, type PlainPart } from '../support/plain-doo-sabin';
import { randomCage } from '../support/random-cages';

const DOO_SABIN: MeasureOptions = { ...CATMULL_CLARK, scheme: 'doo-sabin' };
const RUNS = { numRuns: 8 };

function grouped(cage: Cage, labels: readonly number[]): Cage {
  return { ...cage, groups: { names: Array.from({ length: Math.max(...labels) + 1 }, (_, i) => `part ${i}`), labels: Int32Array.from(labels) } };
}

/** Labels for faces, drawn from a seed. */
function drawn(faces: number, parts: number, seed: number): number[] {
  let state = seed;
  return Array.from({ length: faces }, () => {
    state = (state * 48271) % 2147483647;
    return state % parts;
  });
}

/** A cage less some of its faces; null where faces would meet in a vertex only. */
function pierced(cage: Cage, holes: readonly number[]): Cage | null {
  const faces = facesOf(cage);
  const left = faces.filter((_, f) => !holes.some((hole) => hole % faces.length === f));
  const open = cageOf(Array.from({ length: cage.positions.length / 3 }, (_, v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3))), left);
  return measureCage(open, DOO_SABIN).findings.some((finding) => finding.code === 'non_manifold_vertex') ? null : open;
}

/** Plain refinement, triangles and extrapolation from levels 3 to `last`: nothing of the engine. */
function outside(cage: Cage, labels: readonly number[], boundary: Boundary, last: number): PlainPart[] {
  let mesh = plainCage(cage, labels, boundary);
  const levels: PlainPart[][] = [];
  for (let level = 1; level <= last; level++) {
    mesh = plainRefine(mesh);
    if (level >= 3) levels.push(plainParts(mesh, Math.max(...labels) + 1));
  }
  const all = (p: number, read: (part: PlainPart) => number): number => extrapolated(levels.map((parts) => read(parts[p])));
  return levels[0].map((_, p) => ({
    volume: all(p, (part) => part.volume), area: all(p, (part) => part.area), borderLength: all(p, (part) => part.borderLength),
    cap: all(p, (part) => part.cap), borderMean: [0, 1, 2].map((axis) => all(p, (part) => part.borderMean[axis])),
  }));
}

function plate(columns: number, rows: number, at: (i: number, j: number) => number[]): Cage {
  const points = Array.from({ length: (columns + 1) * (rows + 1) }, (_, v) => at(v % (columns + 1), Math.floor(v / (columns + 1))));
  const faces = Array.from({ length: columns * rows }, (_, f) => {
    const a = Math.floor(f / columns) * (columns + 1) + (f % columns);
    return [a, a + 1, a + columns + 2, a + columns + 1];
  });
  return cageOf(points, faces);
}

describe('parts of a Doo-Sabin surface', () => {
  it('sum to the whole on random cages in random parts', () => {
    fc.assert(fc.property(randomCage, fc.integer({ min: 2, max: 6 }), fc.integer({ min: 1, max: 1e6 }), ({ cage }, parts, seed) => {
      const whole = totalMoments(measureCage(cage, DOO_SABIN).parts);
      const split = measureCage(grouped(cage, drawn(cage.faceStarts.length - 1, parts, seed)), { ...DOO_SABIN, partsBy: 'group' });
      expect(momentError(totalMoments(split.parts), whole, cageSize(cage))).toBeLessThan(1e-13);
    }), RUNS);
  });

  it.each(BOUNDARIES)('have cones that sum to the whole’s on open cages, wherever their borders reach the rim (%s)', (boundary) => {
    fc.assert(fc.property(randomCage, fc.array(fc.nat(50), { minLength: 1, maxLength: 2 }), fc.integer({ min: 2, max: 5 }), fc.integer({ min: 1, max: 1e6 }), ({ cage }, holes, parts, seed) => {
      const open = pierced(cage, holes);
      fc.pre(open !== null);
      if (open === null) return;
      // Cones from the file's origin before any cap, summed over all bodies.
      const cones = (labels: number[]): number[] => {
        const split = grouped(open, labels);
        const { mesh } = buildTopology(split);
        const bodies = partitionFaces(split, mesh, 'group');
        const frames = { ...makeFrames(mesh, split.positions, bodies), positions: split.positions, origins: new Float64Array(3 * bodies.bodies) };
        const { solid } = integrateLimit(mesh, frames, bodies, new Uint8Array(bodies.bodies), { ...DOO_SABIN, boundary });
        const sum = new Array<number>(10).fill(0);
        for (let body = 0; body < bodies.bodies; body++) solid.total(body).forEach((value, k) => (sum[k] += value));
        return sum;
      };
      const faces = open.faceStarts.length - 1;
      const [whole, split] = [cones(drawn(faces, 1, seed)), cones(drawn(faces, parts, seed))];
      const size = cageSize(open);
      whole.forEach((value, k) => expect(Math.abs(split[k] - value)).toBeLessThan(1e-13 * size ** (k === 0 ? 3 : k < 4 ? 4 : 5)));
    }), RUNS);
  });

  it.each(BOUNDARIES)('have borders that close, through extraordinary points, along rims and where three meet at one (%s)', (boundary) => {
    fc.assert(fc.property(randomCage, fc.array(fc.nat(50), { maxLength: 2 }), fc.integer({ min: 1, max: 1e6 }), ({ cage }, holes, seed) => {
      const open = pierced(cage, holes);
      fc.pre(open !== null);
      if (open === null) return;
      const split = grouped(open, drawn(open.faceStarts.length - 1, 4, seed));
      const { mesh } = buildTopology(split);
      const bodies = partitionFaces(split, mesh, 'group');
      const blocked = new Uint8Array(bodies.bodies);
      const { curves, resolved } = integrateLimit(mesh, makeFrames(mesh, split.positions, bodies), bodies, blocked, { ...DOO_SABIN, boundary });
      expect(resolved).toBe(true);
      // What each edge's pieces run through in all, in the order of the loops; a piece runs from −½ to ½ of its powers.
      const way = new Map<number, number[]>();
      curves.edges.forEach((edge, piece) => {
        const sum = way.get(edge) ?? [0, 0, 0];
        sum.forEach((value, axis) => (sum[axis] = value + curves.weights[piece] * (curves.powers[15 * piece + 3 + axis] + curves.powers[15 * piece + 9 + axis] / 4)));
        way.set(edge, sum);
      });
      const borders = findBorders(mesh, bodies, blocked);
      expect(borders.loops.length).toBeGreaterThan(0);
      for (const { steps } of borders.loops) {
        const rest = [0, 0, 0];
        for (const step of steps) {
          const { edge } = borders.segments[step >> 1];
          const [start, end] = [0, 1].map((which) => curves.ends.get(2 * edge + which) ?? [NaN, NaN, NaN]);
          way.get(edge)?.forEach((value, axis) => {
            expect(Math.abs(end[axis] - start[axis] - value)).toBeLessThan(1e-13 * cageSize(open));
            rest[axis] += (step & 1) === 1 ? -value : value;
          });
        }
        rest.forEach((value) => expect(Math.abs(value)).toBeLessThan(1e-13 * cageSize(open) * steps.length));
      }
    }), { numRuns: 20 });
  });

  it('are those of plain refinement, triangles and extrapolation: the faces of a box one by one', () => {
    const box = moved(referenceCage('cube.obj'), (x, y, z) => [x, 1.3 * y + 0.2 * x, 0.7 * z - 0.1 * y]);
    const labels = [0, 1, 2, 3, 4, 5];
    const wanted = outside(box, labels, 'edge-only', 6);
    // The first part has the one loop that is coned from its own mean; the others' caps share its spokes.
    const { parts } = measureCage(grouped(box, [0, 1, 1, 1, 1, 1]), { ...DOO_SABIN, partsBy: 'group' });
    const apart = measureCage(grouped(box, labels), { ...DOO_SABIN, partsBy: 'group' }).parts;
    expect(Math.abs(parts[0].components[0].solid.volume - (wanted[0].volume + wanted[0].cap))).toBeLessThan(1e-8);
    apart.forEach((part, p) => expect(Math.abs(part.components[0].surface.area / wanted[p].area - 1)).toBeLessThan(1e-6));
  });

  it('of an n-gon and of a vertex of valence 5: their cap is the cone over a border that runs through extraordinary points', () => {
    for (const file of ['prism_5.obj', 'icosa.obj', 'pyramid_quad.obj']) {
      const cage = referenceCage(file);
      const labels = facesOf(cage).map((_, f) => (f === 0 ? 0 : 1));
      const wanted = outside(cage, labels, 'edge-only', 6);
      const { parts } = measureCage(grouped(cage, labels), { ...DOO_SABIN, partsBy: 'group' });
      const size = cageSize(cage);
      parts.forEach((part, p) => {
        expect(Math.abs(part.components[0].solid.volume - (wanted[p].volume + wanted[p].cap))).toBeLessThan(1e-6 * size ** 3);
        expect(Math.abs(part.components[0].surface.area - wanted[p].area)).toBeLessThan(1e-5 * size ** 2);
      });
    }
  });
});

/** Polynomials in u and v with whole coefficients: [i][j] is that of uⁱ vʲ. */
type Whole = bigint[][];

function times(a: Whole, b: Whole): Whole {
  const product: Whole = Array.from({ length: a.length + b.length - 1 }, () => Array.from({ length: a[0].length + b[0].length - 1 }, () => 0n));
  a.forEach((row, i) => row.forEach((x, j) => b.forEach((other, k) => other.forEach((y, l) => (product[i + k][j + l] += x * y)))));
  return product;
}

function plus(a: Whole, b: Whole, sign: bigint): Whole {
  return Array.from({ length: Math.max(a.length, b.length) }, (_, i) =>
    Array.from({ length: Math.max(a[0].length, b[0].length) }, (__, j) => (a[i]?.[j] ?? 0n) + sign * (b[i]?.[j] ?? 0n)));
}

/** 2520² ∫₀¹∫₀¹ of a polynomial of degree 9 at most a direction. */
function integral(a: Whole): bigint {
  return a.reduce((sum, row, i) => row.reduce((inner, x, j) => inner + x * (2520n / BigInt(i + 1)) * (2520n / BigInt(j + 1)), sum), 0n);
}

/** Twice the uniform quadratic B-spline's three pieces on [0, 1]: (1 − t)², 1 + 2t − 2t², t². */
const PIECES = [[1n, -2n, 1n], [1n, 2n, -2n], [0n, 0n, 1n]];

/** Volume and second moment xx of the cones from the origin over the biquadratic B-spline surface of a net of whole numbers; exact. */
function exactCones(net: readonly (readonly (readonly number[])[])[]): { volume: number; xx: number } {
  let volume = 0n;
  let xx = 0n;
  for (let i = 0; i + 2 < net.length; i++) {
    for (let j = 0; j + 2 < net[0].length; j++) {
      const x = [0, 1, 2].map((axis): Whole => {
        let sum: Whole = [[0n]];
        for (let a = 0; a < 3; a++) for (let b = 0; b < 3; b++) {
          const value = BigInt(net[i + a][j + b][axis]);
          sum = plus(sum, PIECES[a].map((p) => PIECES[b].map((q) => value * p * q)), 1n);
        }
        return sum;
      });
      const along = x.map((p): Whole => p.slice(1).map((row, k) => row.map((value) => value * BigInt(k + 1))));
      const across = x.map((p): Whole => p.map((row) => row.slice(1).map((value, k) => value * BigInt(k + 1))));
      const minor = (a: number, b: number): Whole => plus(times(along[a], across[b]), times(along[b], across[a]), -1n);
      const determinant = [0, 1, 2].reduce((sum: Whole, a) => plus(sum, times(x[a], minor((a + 1) % 3, (a + 2) % 3)), 1n), [[0n]]);
      volume += integral(determinant);
      xx += integral(times(determinant, times(x[0], x[0])));
    }
  }
  const ratio = (number: bigint, scale: bigint): number => Number((number * 10n ** 24n) / (2520n * 2520n * scale)) / 1e24;
  return { volume: ratio(volume, 3n * 4n ** 3n), xx: ratio(xx, 5n * 4n ** 5n) };
}

describe('open borders of a Doo-Sabin surface', () => {
  it.each([1, 2, 3, 5])('a plate of %i × %i: all of it where corners stay; where they round, less a parabola at each', (n) => {
    const cage = plate(n, n, (i, j) => [i / n, j / n, 0.25]);
    const [kept, round] = (['edge-and-corner', 'edge-only'] as const).map((boundary) => measureCage(cage, { ...DOO_SABIN, boundary }).parts[0]);
    expect(Math.abs(kept.components[0].surface.area - 1)).toBeLessThan(1e-13);
    // The quadratic B-spline of the border polygon cuts the triangle with legs 1/2n at each corner by a parabola: a third of it is lost.
    const area = 1 - 4 / (3 * 8 * n * n);
    const { surface, surfaceErrorEstimate } = round.components[0];
    expect(Math.abs(surface.area / area - 1)).toBeLessThan(1e-12);
    expect(Math.abs(surface.area / area - 1)).toBeLessThanOrEqual(surfaceErrorEstimate);
    surface.centroid.forEach((value, axis) => expect(Math.abs(value - [0.5, 0.5, 0.25][axis])).toBeLessThan(1e-12));
    expect(kept.openEdges).toBe(4 * n);
    expect(round.looksLikeSheet).toBe(true);
  });

  it('is the tensor-product B-spline of the net with its outer rows doubled, by whole-number arithmetic', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 4 }), fc.integer({ min: 1, max: 3 }), fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 60, maxLength: 60 }), (columns, rows, noise) => {
      const at = (i: number, j: number): number[] => [0, 1, 2].map((axis) => noise[(3 * (j * (columns + 1) + i) + axis) % 60] + [40 * i, 40 * j, 100][axis]);
      const doubled = (k: number, last: number): number => Math.min(last, Math.max(0, k - 1));
      const net = Array.from({ length: columns + 3 }, (_, i) => Array.from({ length: rows + 3 }, (__, j) => at(doubled(i, columns), doubled(j, rows))));
      const wanted = exactCones(net);
      const found = limitConeMoments(plate(columns, rows, at), { ...DOO_SABIN, boundary: 'edge-and-corner' }, [0, 0, 0]);
      expect(Math.abs(found.volume / wanted.volume - 1)).toBeLessThan(1e-13);
      expect(Math.abs(found.second[0] - wanted.xx)).toBeLessThan(1e-13 * Math.abs(wanted.volume) * 200 ** 2);
    }), RUNS);
  });

  it.each(BOUNDARIES)('a tube is the periodic B-spline with doubled ends under either rule (%s)', (boundary) => {
    const ring = [[5, 0], [4, 4], [0, 6], [-4, 3], [-5, -1], [0, -5], [4, -3]];
    const points = [0, 3, 7].flatMap((z, k) => ring.map(([x, y]) => [x + k, y - k, z]));
    const faces = [0, 7].flatMap((row) => ring.map((_, i) => [row + i, row + ((i + 1) % 7), row + 7 + ((i + 1) % 7), row + 7 + i]));
    const net = Array.from({ length: 9 }, (_, i) => [0, 0, 1, 2, 2].map((row) => points[7 * row + (i % 7)]));
    const wanted = exactCones(net);
    const found = limitConeMoments(cageOf(points, faces), { ...DOO_SABIN, boundary }, [0, 0, 0]);
    expect(Math.abs(found.volume / wanted.volume - 1)).toBeLessThan(1e-13);
    expect(Math.abs(found.second[0] - wanted.xx)).toBeLessThan(1e-13 * Math.abs(wanted.volume) * 36);
  });

  it.each(BOUNDARIES)('is that of plain refinement with doubled borders: n-gons, two-valent vertices and several holes (%s)', (boundary) => {
    const bowl = cageOf(
      [[0, 0, 0], [2, 0, 0.3], [3, 1.5, 1], [1, 2.8, 0.4], [-1, 1.4, 0.8], [2.2, -1.5, 1.2], [4, 0.2, 1.9], [1, 4, 1.6]],
      [[0, 1, 2, 3, 4], [0, 5, 1], [1, 5, 6, 2], [2, 7, 3]],
    );
    const frame = pierced(referenceCage('icosa.obj'), [0, 7]);
    for (const cage of [bowl, cageOf([[0, 0, 0], [3, 0, 1], [1, 2, 0]], [[0, 1, 2]]), ...(frame === null ? [] : [frame])]) {
      const labels = facesOf(cage).map(() => 0);
      const [wanted] = outside(cage, labels, boundary, 6);
      const size = cageSize(cage);
      expect(Math.abs(limitConeMoments(cage, { ...DOO_SABIN, boundary }, [0, 0, 0]).volume - wanted.volume)).toBeLessThan(1e-6 * size ** 3);
      expect(Math.abs(measureCage(cage, { ...DOO_SABIN, boundary }).parts[0].components[0].surface.area - wanted.area)).toBeLessThan(2e-5 * size ** 2);
    }
  });
});

describe('odd cages under Doo-Sabin', () => {
  it('two faces on the same vertices, all of valence 2, and a box with split edges: as plain refinement', () => {
    const pillow = cageOf([[0, 0, 0], [2, 0, 1], [2, 2, 0], [0, 2, 1]], [[0, 1, 2, 3], [3, 2, 1, 0]]);
    const puffed = cageOf(
      [[-1, -1, -1], [1, -1, -1], [1, 1, -1], [-1, 1, -1], [-1, -1, 1], [1, -1, 1], [1, 1, 1], [-1, 1, 1], [0, -1.4, -1.2]],
      [[3, 2, 1, 8, 0], [4, 5, 6, 7], [0, 8, 1, 5, 4], [1, 2, 6, 5], [2, 3, 7, 6], [3, 0, 4, 7]],
    );
    for (const cage of [pillow, puffed]) {
      const [wanted] = outside(cage, facesOf(cage).map(() => 0), 'edge-only', 6);
      expect(Math.abs(limitConeMoments(cage, DOO_SABIN, [0, 0, 0]).volume - wanted.volume)).toBeLessThan(1e-5);
    }
  });

  it('says which tags it cannot carry, and what they are on', () => {
    const cube = referenceCage('cube.obj');
    const tagged: Cage = {
      ...cube, creaseVertices: Uint32Array.from([0, 1]), creaseSharpness: Float32Array.from([2]),
      cornerVertices: Uint32Array.from([3]), cornerSharpness: Float32Array.from([10]),
    };
    const { findings, parts } = measureCage(tagged, DOO_SABIN);
    const found = findings.filter((finding) => finding.code.endsWith('_not_carried')).sort((a, b) => (a.code < b.code ? -1 : 1));
    expect(found.map(({ code, severity, count }) => [code, severity, count])).toEqual([['corner_not_carried', 'warning', 1], ['crease_not_carried', 'warning', 1]]);
    expect(found[0].places[0].vertex).toBe(3);
    expect(found[1].places[0].edge?.slice().sort()).toEqual([0, 1]);
    expect(momentError(totalMoments(parts), totalMoments(measureCage(cube, DOO_SABIN).parts), cageSize(cube))).toBe(0);
    expect(measureCage(cube, DOO_SABIN).findings).toEqual([]);
  });

  it('a part beside one with a problem keeps its number', () => {
    const frame = referenceCage('torus_reg_quad.obj');
    const faces = facesOf(frame);
    const labels = faces.map((_, f) => (f < 4 ? 0 : 1));
    const sound = measureCage(grouped(frame, labels), { ...DOO_SABIN, partsBy: 'group' }).parts[0];
    // A face laid twice over one of the other part, far from the border, blocks that part alone.
    const far = faces.findIndex((face, f) => f >= 4 && !face.some((v) => faces.some((other, g) => g < 4 && other.includes(v))));
    const points = Array.from({ length: frame.positions.length / 3 }, (_, v) => Array.from(frame.positions.subarray(3 * v, 3 * v + 3)));
    const spoilt = measureCage(grouped(cageOf(points, [...faces, faces[far]]), [...labels, 1]), { ...DOO_SABIN, partsBy: 'group' });
    expect(spoilt.parts[1].components).toEqual([]);
    expect(Math.abs(spoilt.parts[0].components[0].solid.volume - sound.components[0].solid.volume)).toBeLessThan(1e-14);
  });
});
