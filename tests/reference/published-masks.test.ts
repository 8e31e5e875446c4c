import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions, Six, Three } from '@/lib/engine/measured';
import { buildTopology } from '@/lib/engine/mesh/topology';
import { refineAround } from '@/lib/engine/schemes/catmull-clark-refine';
import { dooSabinCage } from '@/lib/engine/schemes/doo-sabin-mesh';
import { refineDooSabin } from '@/lib/engine/schemes/doo-sabin-refine';
import { levelZero, type LevelMesh } from '@/lib/engine/schemes/level-mesh';
import { limitPoints, loopSmoothLimit } from '@/lib/engine/schemes/limit-points';
import { refineTriangles } from '@/lib/engine/schemes/loop-refine';
import { cageOf, cageSize, CATMULL_CLARK, facesOf, momentError, referenceCage, totalMoments } from '../support/engine-cages';
import limits from './limits.json';

/**
 * Rows of weights: each cage is refined once for every vertex with x = 1 there and 0 elsewhere, so that the x of a new point is that vertex' weight.
 * Answers, sorted and rounded to 12 digits, the rows that occur.
 */
function rowsOf(cage: Cage, refine: (level: LevelMesh) => LevelMesh | Float64Array): Set<string> {
  const { mesh } = buildTopology(cage);
  const count = cage.positions.length / 3;
  let rows: number[][] = [];
  for (let v = 0; v < count; v++) {
    const positions = new Float64Array(3 * count);
    positions[3 * v] = 1;
    const fine = refine(levelZero(mesh, positions, new Int32Array(mesh.faces), new Uint8Array(1), 'edge-only'));
    const points = fine instanceof Float64Array ? fine : fine.positions;
    if (v === 0) rows = Array.from({ length: points.length / 3 }, () => []);
    rows.forEach((row, i) => row.push(points[3 * i]));
  }
  return new Set(rows.map(written));
}

const written = (row: readonly number[]): string => row.filter((value) => Math.abs(value) > 1e-14).map((value) => value.toFixed(12)).sort().join(' ');
const times = (n: number, value: number): number[] => new Array<number>(n).fill(value);

/** A cube with its corners numbered by x, then y, then z. */
const CUBE = cageOf([0, 1, 2, 3, 4, 5, 6, 7].map((i) => [i & 1, (i >> 1) & 1, i >> 2]), [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]]);

const catmullClark = (options: MeasureOptions = CATMULL_CLARK) => (level: LevelMesh) => refineAround(level, options);
const loop = (level: LevelMesh): LevelMesh => refineTriangles(level, CATMULL_CLARK);

/** All edges at a vertex of a cage, or those of one loop, made sharp for good. */
const creased = (cage: Cage, edges: readonly (readonly [number, number])[]): Cage => ({ ...cage, creaseVertices: Uint32Array.from(edges.flat()), creaseSharpness: new Float32Array(edges.length).fill(10) });

// E. Catmull, J. Clark, Computer-Aided Design 10 (1978): face point the mean; edge point the mean of both ends and both face points;
// vertex point (Q + 2R + (n − 3)S)/n, Q the mean of the face points around, R that of the edges' middles, S the vertex.
describe('Catmull & Clark 1978', () => {
  it.each([['torus_reg_quad.obj', 4], ['cube.obj', 3]])('%s: quads', (file, n) => {
    const rows = rowsOf(referenceCage(file), catmullClark());
    // A far corner of a quad weighs 1/(4n²); a near one 2/(2n²) + 2/(4n²) = 3/(2n²); the vertex the rest, 9/16 in the regular case.
    const wanted = [times(4, 1 / 4), [...times(2, 3 / 8), ...times(4, 1 / 16)], [1 - 7 / (4 * n), ...times(n, 3 / (2 * n * n)), ...times(n, 1 / (4 * n * n))]];
    expect(rows).toEqual(new Set(wanted.map(written)));
  });

  it.each([['octa.obj', 4], ['icosa.obj', 5], ['tetra.obj', 3]])('%s: triangles', (file, n) => {
    const rows = rowsOf(referenceCage(file), catmullClark());
    const vertex = [1 / (3 * n) + 1 / n + (n - 3) / n, ...times(n, 2 / (3 * n * n) + 1 / (n * n))];
    expect(rows).toEqual(new Set([times(3, 1 / 3), [...times(2, 5 / 12), ...times(2, 1 / 12)], vertex].map(written)));
  });

  // The open standard's option "smooth": a triangle's face point weighs 0.470 in its edge points and the ends share the rest
  // (opensubdiv/sdc/catmarkScheme.h, assignSmoothMaskForEdge): 0.03 + 2·0.47/3 for an end, 0.47/3 for the points across.
  it('triangles under the rule "smooth"', () => {
    const rows = rowsOf(referenceCage('icosa.obj'), catmullClark({ ...CATMULL_CLARK, triangles: 'smooth' }));
    expect(rows).toContain(written([...times(2, 0.03 + 0.94 / 3), ...times(2, 0.47 / 3)]));
    // Between a triangle and a quad the weight is the mean of 0.47 and 0.25: 0.36 each, 0.14 for the ends.
    const pyramid = rowsOf(referenceCage('pyramid_quad.obj'), catmullClark({ ...CATMULL_CLARK, triangles: 'smooth' }));
    expect(pyramid).toContain(written([...times(2, 0.14 + 0.36 / 3 + 0.36 / 4), 0.36 / 3, ...times(2, 0.36 / 4)]));
  });

  // M. Halstead, M. Kass, T. DeRose, SIGGRAPH 1993: limit (n²v + 4Σe + Σf)/(n(n + 5)).
  it.each([['torus_reg_quad.obj', 4], ['cube.obj', 3]])('%s: limit points', (file, n) => {
    const rows = rowsOf(referenceCage(file), (level) => limitPoints(level));
    expect(rows).toEqual(new Set([written([n / (n + 5), ...times(n, 4 / (n * (n + 5))), ...times(n, 1 / (n * (n + 5)))])]));
  });
});

// C. Loop, thesis, University of Utah 1987: edge (3, 3, 1, 1)/8; vertex 1 − nβ and β, β = (5/8 − (3/8 + cos(2π/n)/4)²)/n,
// which is 3/16 for n = 3 and 1/16 for n = 6; 31/256 for n = 4, and cos(2π/5) = (√5 − 1)/4; limit (⅜v + β Σe)/(⅜ + nβ).
describe('Loop 1987', () => {
  it.each([['tetra.obj', 3, 3 / 16], ['octa.obj', 4, 31 / 256], ['icosa.obj', 5, (5 / 8 - (3 / 8 + (Math.sqrt(5) - 1) / 16) ** 2) / 5], ['torus_reg_tri.obj', 6, 1 / 16]])('%s', (file, n, beta) => {
    expect(rowsOf(referenceCage(file), loop)).toEqual(new Set([[...times(2, 3 / 8), ...times(2, 1 / 8)], [1 - n * beta, ...times(n, beta)]].map(written)));
    const limit = [0.375 / (0.375 + n * beta), ...times(n, beta / (0.375 + n * beta))];
    expect(rowsOf(referenceCage(file), (level) => limitPoints(level, loopSmoothLimit))).toEqual(new Set([written(limit)]));
  });
});

// D. Doo, M. Sabin, Computer-Aided Design 10 (1978): corner j of an n-gon from corner i by (n + 5)/(4n) for i = j, else (3 + 2 cos(2π(i − j)/n))/(4n);
// for a quad the (9, 3, 1, 3)/16 of the biquadratic B-spline.
describe('Doo & Sabin 1978', () => {
  const dooSabin = (level: LevelMesh): LevelMesh => {
    const all = new Uint8Array(level.vertices).fill(1);
    return refineDooSabin(dooSabinCage(level, 'edge-only'), all, all);
  };

  it.each([['cube.obj', [[9, 3, 1, 3].map((x) => x / 16)]], ['octa.obj', [[2 / 3, 1 / 6, 1 / 6]]]])('%s', (file, rows) => {
    expect(rowsOf(referenceCage(file), dooSabin)).toEqual(new Set(rows.map(written)));
  });

  it('a pentagon', () => {
    const golden = (Math.sqrt(5) - 1) / 4;
    const pentagon = [1 / 2, ...times(2, (3 + 2 * golden) / 20), ...times(2, (3 - 2 * (golden + 0.5)) / 20)];
    expect(rowsOf(referenceCage('prism_5.obj'), dooSabin)).toEqual(new Set([pentagon, [9, 3, 1, 3].map((x) => x / 16)].map(written)));
  });
});

// H. Biermann, A. Levin, D. Zorin, SIGGRAPH 2000, and T. DeRose, M. Kass, T. Truong, SIGGRAPH 1998: along a crease (1, 6, 1)/8 and (1, 1)/2, corners stay; limit (1, 4, 1)/6.
describe('creases', () => {
  const ring: [number, number][] = [[0, 1], [1, 3], [3, 2], [2, 0]];

  it('a ring of sharp edges', () => {
    const cage = creased(CUBE, ring);
    const rows = rowsOf(cage, catmullClark());
    for (const row of [[1 / 8, 6 / 8, 1 / 8], [1 / 2, 1 / 2]]) expect(rows).toContain(written(row));
    expect(rowsOf(cage, (level) => limitPoints(level))).toContain(written([1 / 6, 4 / 6, 1 / 6]));
  });

  it('three sharp edges make a corner, one leaves the smooth rule', () => {
    expect(rowsOf(creased(CUBE, [[0, 1], [0, 2], [0, 4]]), catmullClark())).toContain(written([1]));
    const dart = [1 - 7 / 12, ...times(3, 1 / 6), ...times(3, 1 / 36)];
    expect(rowsOf(creased(CUBE, [[0, 1]]), catmullClark())).toContain(written(dart));
  });

  it('the same for triangles', () => {
    const octa = referenceCage('octa.obj');
    const corners = facesOf(octa).flatMap((face) => face.map((v, i) => [v, face[(i + 1) % 3]] as const));
    const equator = corners.filter(([a, b]) => a < b && octa.positions[3 * a + 2] === 0 && octa.positions[3 * b + 2] === 0);
    expect(equator).toHaveLength(4);
    const rows = rowsOf(creased(octa, equator), loop);
    for (const row of [[1 / 8, 6 / 8, 1 / 8], [1 / 2, 1 / 2]]) expect(rows).toContain(written(row));
  });
});

// Chaikin creasing mixes ¾ of an edge's sharpness with ¼ of the mean of the other semi-sharp ones at its end [DeRose, Kass & Truong 1998];
// along a ring of one sharpness that is the uniform rule, whose limits are in limits.json.
describe('Chaikin creasing', () => {
  const rings = limits.cases.filter((row) => row.scheme === 'catmull-clark' && /^brick_ring_[\d.]+$/.test(row.name));

  it('there are such rings', () => expect(rings.length).toBeGreaterThan(2));

  it.each(rings.map((row) => [row.name, row] as const))('%s keeps its limit', (_, row) => {
    const cage = referenceCage(row.cage);
    const { parts } = measureCage(cage, { ...CATMULL_CLARK, creasing: 'chaikin' });
    expect(momentError(totalMoments(parts), { volume: row.volume, first: row.first as Three, second: row.second as Six }, cageSize(cage))).toBeLessThan(1e-13);
  });

  it('¾ · 2 + ¼ · (3 + 4)/2 − 1 and its like at a vertex of three sharpnesses', () => {
    const cage: Cage = { ...CUBE, creaseVertices: Uint32Array.from([0, 1, 0, 2, 0, 4]), creaseSharpness: Float32Array.of(2, 3, 4) };
    const { mesh } = buildTopology(cage);
    const fine = refineAround(levelZero(mesh, cage.positions, new Int32Array(mesh.faces), new Uint8Array(1), 'edge-only'), { ...CATMULL_CLARK, creasing: 'chaikin' });
    // At the shared vertex, and at the other ends where no other edge is semi-sharp.
    expect(new Set(fine.edgeSharpness)).toEqual(new Set([0, 1.375, 2, 2.625, 1, 3]));
  });
});

// Under "smooth" the first step alone differs; its result is a cage of quads, which the test makes by the published rules.
describe('the triangle rule "smooth"', () => {
  it('gives the limit of the cage that its first step leaves', () => {
    const octa = referenceCage('octa.obj');
    const faces = facesOf(octa);
    const at = (v: number): number[] => Array.from(octa.positions.subarray(3 * v, 3 * v + 3));
    const mix = (terms: readonly (readonly [number, number[]])[]): number[] => [0, 1, 2].map((axis) => terms.reduce((sum, [weight, p]) => sum + weight * p[axis], 0));
    const points = octa.positions.length / 3;
    const facePoints = faces.map((face) => mix(face.map((v) => [1 / 3, at(v)] as const)));
    const vertexPoints = Array.from({ length: points }, (_, v) => {
      const around = faces.flatMap((face, f) => (face.includes(v) ? [f] : []));
      const far = [...new Set(around.flatMap((f) => faces[f]))].filter((w) => w !== v);
      const n = around.length;
      return mix([[(n - 2) / n, at(v)], ...far.map((w) => [1 / (n * n), at(w)] as const), ...around.map((f) => [1 / (n * n), facePoints[f]] as const)]);
    });
    const edges = faces.flatMap((face) => face.map((v, i) => [v, face[(i + 1) % 3]])).filter(([a, b]) => a < b);
    const edgePoints = edges.map(([a, b]) => {
      const beside = faces.flatMap((face, f) => (face.includes(a) && face.includes(b) ? [f] : []));
      return mix([[0.03, at(a)], [0.03, at(b)], ...beside.map((f) => [0.47, facePoints[f]] as const)]);
    });
    const edge = (a: number, b: number): number => points + edges.findIndex(([x, y]) => (x === a && y === b) || (x === b && y === a));
    const quads = faces.flatMap((face, f) => face.map((v, i) => [v, edge(v, face[(i + 1) % 3]), points + edges.length + f, edge(face[(i + 2) % 3], v)]));
    const refined = cageOf([...vertexPoints, ...edgePoints, ...facePoints], quads);
    const [wanted, found] = [totalMoments(measureCage(refined, CATMULL_CLARK).parts), totalMoments(measureCage(octa, { ...CATMULL_CLARK, triangles: 'smooth' }).parts)];
    expect(momentError(found, wanted, cageSize(octa))).toBeLessThan(1e-13);
    expect(momentError(totalMoments(measureCage(octa, CATMULL_CLARK).parts), wanted, cageSize(octa))).toBeGreaterThan(1e-3);
  });
});
