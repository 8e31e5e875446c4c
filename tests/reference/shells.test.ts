import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage, Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredComponent, MeasureOptions } from '@/lib/engine/measured';
import { wallMoments, type HollowComponent } from '@/lib/engine/shell/wall-moments';
import { cageOf, CATMULL_CLARK, facesOf, moved, referenceCage } from '../support/engine-cages';
import { refinedOnce } from '../support/random-cages';

// Parallel bodies: J. Steiner, "Über parallele Flächen", Monatsberichte der Akademie Berlin (1840); H. Weyl, "On the volume of tubes", Amer. J. Math. 61 (1939);
// volumes and moments of cuboid, sphere and torus from the handbooks; all from memory.

const options = (scheme: Scheme): MeasureOptions => ({ ...CATMULL_CLARK, scheme, shells: true });

function hollowOf(cage: Cage, scheme: Scheme): MeasuredComponent & HollowComponent {
  const [component] = measureCage(cage, options(scheme)).parts[0].components;
  const { hollow, hollowLimits } = component;
  if (hollow === null || hollowLimits === null) throw new Error('the wall was not measured');
  return { ...component, hollow, hollowLimits };
}

/** Coefficient of t^power in one of the ten moments. */
function coefficient({ hollow }: HollowComponent, moment: number, power: number): number {
  return hollow[5 * moment + power - 1];
}

function cuboid(a: number, b: number, c: number, sharp: boolean): Cage {
  const corners = [0, 1, 2, 3, 4, 5, 6, 7].map((i) => [(i & 1 ? a : -a) / 2, (i & 2 ? b : -b) / 2, (i & 4 ? c : -c) / 2]);
  const faces = [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]];
  const edges = [0, 1, 2, 3, 4, 5, 6, 7].flatMap((i) => [1, 2, 4].filter((bit) => !(i & bit)).map((bit): [number, number, number] => [i, i | bit, 10]));
  return cageOf(corners, faces, sharp ? edges : []);
}

/** A right cylinder over a polygon with `rows` rows of quads between two n-gons, its rims sharp. */
function drum(n: number, height: number, radius: (angle: number) => number): Cage {
  const rows = 3;
  const points = Array.from({ length: n * (rows + 1) }, (_, i) => {
    const angle = (2 * Math.PI * (i % n)) / n;
    return [radius(angle) * Math.cos(angle), radius(angle) * Math.sin(angle), (height * Math.floor(i / n)) / rows];
  });
  const side = Array.from({ length: n * rows }, (_, i) => [i, n * Math.floor(i / n) + ((i + 1) % n), n * Math.floor(i / n) + ((i + 1) % n) + n, i + n]);
  const rim = Array.from({ length: n }, (_, i) => i);
  const creases = [0, rows].flatMap((row) => rim.map((i): [number, number, number] => [n * row + i, n * row + ((i + 1) % n), 10]));
  return cageOf(points, [...side, rim.slice().reverse(), rim.map((i) => n * rows + i)], creases);
}

describe('walls of cuboids with sharp edges: the outer cuboid less the inner one', () => {
  const [a, b, c] = [2, 3, 5];
  it.each(['polyhedral', 'catmull-clark'] as const)('%s: exact to t² and within the estimate at corners', (scheme) => {
    const wall = hollowOf(cuboid(a, b, c, scheme !== 'polyhedral'), scheme);
    expect(coefficient(wall, 0, 1)).toBeCloseTo(2 * (a * b + b * c + c * a), 11);
    expect(coefficient(wall, 0, 2)).toBeCloseTo(-4 * (a + b + c), 11);
    // ∫ x² of the wall: [a³ b c − (a − 2t)³ (b − 2t)(c − 2t)]/12, expanded.
    expect(coefficient(wall, 4, 1)).toBeCloseTo((6 * a * a * b * c + 2 * a ** 3 * (b + c)) / 12, 11);
    expect(coefficient(wall, 4, 2)).toBeCloseTo(-(12 * a * b * c + 12 * a * a * (b + c) + 4 * a ** 3) / 12, 10);
    const size = Math.hypot(a, b, c) / 2;
    for (const t of [0.01, 0.1, 0.4]) {
      const inner = [a - 2 * t, b - 2 * t, c - 2 * t];
      const exact = a * b * c - inner[0] * inner[1] * inner[2];
      const found = wallMoments(wall, t);
      // What is missing is the corners' 8 t³, which the estimate must cover without being out of proportion.
      expect(found.measure - exact).toBeCloseTo(-8 * t ** 3, 11);
      expect(Math.abs(found.measure - exact) / found.measure).toBeLessThanOrEqual(found.error);
      expect(found.error).toBeLessThan((10 * 8 * t ** 3) / exact);
      for (let axis = 0; axis < 3; axis++) {
        const second = (a * b * c * [a, b, c][axis] ** 2 - inner[0] * inner[1] * inner[2] * inner[axis] ** 2) / 12;
        expect(Math.abs(found.centralSecond[axis] - second) / (found.measure * size * size)).toBeLessThanOrEqual(found.error);
      }
    }
  });

  it('an octahedron, whose four faces a corner have no single inner corner', () => {
    const wall = hollowOf(referenceCage('octa_allsharp.obj'), 'loop');
    // Insphere 1/√3 of the unit octahedron: V(t) = 4/3 (1 − (1 − √3 t)³).
    for (const t of [0.01, 0.1, 0.3]) {
      const exact = (4 / 3) * (1 - (1 - Math.sqrt(3) * t) ** 3);
      const found = wallMoments(wall, t);
      expect(Math.abs(found.measure - exact) / found.measure).toBeLessThanOrEqual(found.error);
    }
    expect(coefficient(wall, 0, 2)).toBeCloseTo(-12, 11);
  });
});

describe('right cylinders with sharp rims: (A − P t + π t²)(h − 2t) is left of A h', () => {
  // Steiner in the plane: a smooth convex section loses P t − π t². Rims are curved sharp edges, caps n-gons with one face at each rim vertex.
  it.each([[8, () => 1], [6, (angle: number) => 1 + 0.2 * Math.cos(2 * angle)]] as const)('over %i points', (n, radius) => {
    const height = 3;
    const wall = hollowOf(drum(n, height, radius), 'catmull-clark');
    const section = wall.solid.volume / height;
    const perimeter = (wall.surface.area - 2 * section) / height;
    expect(Math.abs(coefficient(wall, 0, 2) + Math.PI * height + 2 * perimeter)).toBeLessThan(1e-8);
    expect(Math.abs(coefficient(wall, 0, 3) - 2 * Math.PI)).toBeLessThan(Math.max(1e-7, wall.hollowLimits.error[2]));
    // ∫ z about the middle vanishes, ∫ z² of both caps and the side: [A h³ − (A − P t + π t²)(h − 2t)³]/12, its t² term.
    const t2 = -(Math.PI * height ** 3 + 6 * perimeter * height ** 2 + 12 * section * height) / 12;
    expect(Math.abs(coefficient(wall, 6, 2) - t2)).toBeLessThan(1e-7);
  });
});

describe('smooth closed surfaces: ∫ K = 2π χ, so that t³ is 2π χ/3 (Gauss and Bonnet)', () => {
  const cases: [string, Scheme, number][] = [
    ['cube.obj', 'catmull-clark', 2], ['prism_16.obj', 'catmull-clark', 2], ['bipyramid_32.obj', 'catmull-clark', 2], ['torus_8x6.obj', 'catmull-clark', 0],
    ['frame_genus1.obj', 'catmull-clark', 0], ['brick_ring_2.3.obj', 'catmull-clark', 2], ['cube.obj', 'doo-sabin', 2], ['prism_8.obj', 'doo-sabin', 2],
    ['torus_8x6.obj', 'doo-sabin', 0], ['octa.obj', 'loop', 2], ['icosa.obj', 'loop', 2], ['tetra.obj', 'loop', 2], ['bipyramid_12.obj', 'loop', 2], ['torus_reg_tri.obj', 'loop', 0],
  ];
  it.each(cases)('%s, %s', (file, scheme, characteristic) => {
    const wall = hollowOf(referenceCage(file), scheme);
    const wanted = (2 * Math.PI * characteristic) / 3;
    expect(Math.abs(coefficient(wall, 0, 3) - wanted)).toBeLessThanOrEqual(wall.hollowLimits.error[2]);
    expect(Math.abs(coefficient(wall, 0, 3) - wanted)).toBeLessThan(1e-7);
  });
});

/** Six values by which a wall is compared: volume at t, and those moments that need no frame of their own. */
function valuesAt(wall: HollowComponent, t: number): number[] {
  const { measure, centroid, centralSecond } = wallMoments(wall, t);
  return [measure, ...centroid, ...centralSecond];
}

describe('handbook shapes, by cages that come near them', () => {
  /** A cube's faces in n × n quads, blown up to the unit sphere. */
  function ball(steps: number): Cage {
    let cage = cuboid(2, 2, 2, false);
    for (let i = 0; i < steps; i++) cage = refinedOnce(cage, options('catmull-clark'));
    return moved(cage, (x, y, z) => {
      const length = Math.hypot(x, y, z);
      return [x / length, y / length, z / length];
    });
  }

  it('a spherical shell, as far as the surface is a sphere', () => {
    const wall = hollowOf(ball(4), 'catmull-clark');
    const radius = Math.cbrt((3 * wall.solid.volume) / (4 * Math.PI));
    const roundness = Math.abs(Math.sqrt(wall.surface.area / (4 * Math.PI)) / radius - 1) + 1e-4;
    for (const t of [0.001, 0.1, 0.5]) {
      const inner = radius - t;
      const found = wallMoments(wall, t);
      const exact = (4 * Math.PI * (radius ** 3 - inner ** 3)) / 3;
      expect(Math.abs(found.measure / exact - 1)).toBeLessThan(10 * roundness);
      for (let axis = 0; axis < 3; axis++) {
        const second = (4 * Math.PI * (radius ** 5 - inner ** 5)) / 15;
        expect(Math.abs(found.centralSecond[axis] / second - 1)).toBeLessThan(10 * roundness);
      }
    }
  });

  function ring(n: number): Cage {
    const [R, r] = [3, 1];
    const points = Array.from({ length: n * n }, (_, i) => {
      const [a, b] = [(2 * Math.PI * Math.floor(i / n)) / n, (2 * Math.PI * (i % n)) / n];
      return [(R + r * Math.cos(b)) * Math.cos(a), (R + r * Math.cos(b)) * Math.sin(a), r * Math.sin(b)];
    });
    const at = (i: number, j: number): number => n * (i % n) + (j % n);
    return cageOf(points, Array.from({ length: n * n }, (_, k) => {
      const [i, j] = [Math.floor(k / n), k % n];
      return [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)];
    }));
  }

  it('a torus shell: 2π² R (r² − (r − t)²), extrapolated over three cages', () => {
    const t = 0.2;
    const [coarse, middle, fine] = [24, 48, 96].map((n) => wallMoments(hollowOf(ring(n), 'catmull-clark'), t).measure);
    const [first, second] = [(4 * middle - coarse) / 3, (4 * fine - middle) / 3];
    const extrapolated = (16 * second - first) / 15;
    expect(Math.abs(extrapolated / (2 * Math.PI ** 2 * 3 * (1 - 0.8 ** 2)) - 1)).toBeLessThan(1e-7);
  });

  it('the smallest radius of a torus that bends inwards is that of its tube', () => {
    const { curvature, position } = hollowOf(ring(48), 'catmull-clark').hollowLimits;
    expect(Math.abs(1 / curvature - 1)).toBeLessThan(0.01);
    expect(Math.abs(Math.hypot(Math.hypot(position[0], position[1]) - 3, position[2]) - 1)).toBeLessThan(0.01);
  });
});

/** Limit points and normals of a closed smooth quad mesh by the published masks [Halstead, Kass & DeRose 1993], to compare with from outside. */
function limitMesh(cage: Cage): { points: number[][]; normals: number[][] } {
  const faces = facesOf(cage);
  const point = (v: number): number[] => [cage.positions[3 * v], cage.positions[3 * v + 1], cage.positions[3 * v + 2]];
  const next = Array.from({ length: cage.positions.length / 3 }, () => new Map<number, [number, number]>());
  // After vertex v the face goes to `to`; coming back to v from `from`, with the corner opposite.
  for (const face of faces) face.forEach((v, i) => next[v].set(face[(i + 1) % 4], [face[(i + 3) % 4], face[(i + 2) % 4]]));
  const points: number[][] = [];
  const normals: number[][] = [];
  next.forEach((around, v) => {
    const n = around.size;
    const spokes: number[] = [];
    const opposite: number[] = [];
    for (let spoke = [...around.keys()][0]; spokes.length < n; ) {
      const [following, across] = around.get(spoke)!;
      spokes.push(spoke);
      opposite.push(across);
      spoke = following;
    }
    const A = 1 + Math.cos((2 * Math.PI) / n) + Math.cos(Math.PI / n) * Math.sqrt(2 * (9 + Math.cos((2 * Math.PI) / n)));
    const tangent = (turn: number): number[] => [0, 1, 2].map((axis) => spokes.reduce((sum, spoke, i) => {
      const angle = (2 * Math.PI * (i + turn)) / n;
      return sum + A * Math.cos(angle) * point(spoke)[axis] + (Math.cos(angle) + Math.cos(angle + (2 * Math.PI) / n)) * point(opposite[i])[axis];
    }, 0));
    points.push([0, 1, 2].map((axis) => (n * n * point(v)[axis] + spokes.reduce((sum, spoke, i) => sum + 4 * point(spoke)[axis] + point(opposite[i])[axis], 0)) / (n * (n + 5))));
    const [p, q] = [tangent(0), tangent(-n / 4)];
    const normal = [p[1] * q[2] - p[2] * q[1], p[2] * q[0] - p[0] * q[2], p[0] * q[1] - p[1] * q[0]];
    const length = Math.hypot(...normal);
    normals.push(normal.map((value) => value / length));
  });
  return { points, normals };
}

/** Volume between the limit mesh after some refinements and the same mesh moved inwards by t. */
function sweptVolume(cage: Cage, steps: number, t: number): number {
  let fine = cage;
  for (let i = 0; i < steps; i++) fine = refinedOnce(fine, options('catmull-clark'));
  const { points, normals } = limitMesh(fine);
  const volume = (at: (v: number) => number[]): number => facesOf(fine).reduce((sum, face) => {
    const [a, b, c, d] = face.map(at);
    const det = (p: number[], q: number[], r: number[]): number => p[0] * (q[1] * r[2] - q[2] * r[1]) + p[1] * (q[2] * r[0] - q[0] * r[2]) + p[2] * (q[0] * r[1] - q[1] * r[0]);
    // Both ways of cutting the quad, halved: symmetric, so that errors are even in the mesh width.
    return sum + (det(a, b, c) + det(a, c, d) + det(b, c, d) + det(b, d, a)) / 12;
  }, 0);
  return volume((v) => points[v]) - volume((v) => points[v].map((value, axis) => value - t * normals[v][axis]));
}

describe('the volume between a surface and its fine tessellation moved inwards', () => {
  it.each(['cube.obj', 'prism_5.obj'])('%s', (file) => {
    const cage = refinedOnce(referenceCage(file), options('catmull-clark'));
    const wall = hollowOf(referenceCage(file), 'catmull-clark');
    for (const t of [0.05, 0.2]) {
      const [coarse, middle, fine] = [2, 3, 4].map((steps) => sweptVolume(cage, steps, t));
      const extrapolated = (4 * fine - middle) / 3;
      const doubt = Math.abs(extrapolated - (4 * middle - coarse) / 3);
      const { measure } = wallMoments(wall, t);
      expect(doubt / measure).toBeLessThan(1e-3);
      expect(Math.abs(measure - extrapolated)).toBeLessThan(doubt);
    }
  }, 60_000);
});

describe('estimates and invariances', () => {
  it.each(['cube.obj', 'brick_dart1.obj', 'box3_rim_inf.obj', 'prism_8.obj', 'spot.obj', 'brick_ring_2.3.obj', 'brick_ring_10.obj', 'brick_corner_inf.obj'])('%s: the cage refined once has the same wall, within both estimates', (file) => {
    const cage = referenceCage(file);
    const [one, two] = [hollowOf(cage, 'catmull-clark'), hollowOf(refinedOnce(cage, options('catmull-clark')), 'catmull-clark')];
    for (const power of [2, 3] as const) {
      const doubt = one.hollowLimits.error[power - 1] + two.hollowLimits.error[power - 1];
      expect(Math.abs(coefficient(one, 0, power) - coefficient(two, 0, power))).toBeLessThanOrEqual(doubt);
    }
    expect(Math.abs(coefficient(one, 0, 2) / coefficient(two, 0, 2) - 1)).toBeLessThan(1e-6);
  });

  it('scales by powers of the size and turns with the part', () => {
    const cage = referenceCage('prism_5.obj');
    const base = hollowOf(cage, 'catmull-clark');
    fc.assert(fc.property(fc.double({ min: 0.01, max: 100, noNaN: true }), fc.double({ min: 0, max: 6, noNaN: true }), fc.double({ min: 0.001, max: 0.3, noNaN: true }), (scale, angle, t) => {
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      const other = hollowOf(moved(cage, (x, y, z) => [scale * (c * x - s * y) + 7, scale * (s * x + c * y) - 3, scale * z + 1]), 'catmull-clark');
      const [found, wanted] = [wallMoments(other, scale * t), wallMoments(base, t)];
      expect(Math.abs(found.measure / (scale ** 3 * wanted.measure) - 1)).toBeLessThan(1e-9);
      const [x, y, z] = wanted.centroid;
      [scale * (c * x - s * y) + 7, scale * (s * x + c * y) - 3, scale * z + 1].forEach((value, axis) => expect(Math.abs(found.centroid[axis] - value)).toBeLessThan(1e-9 * (10 + scale)));
      const [xx, yy, zz, xy] = wanted.centralSecond;
      const turned = [c * c * xx - 2 * c * s * xy + s * s * yy, s * s * xx + 2 * c * s * xy + c * c * yy, zz];
      turned.forEach((value, axis) => expect(Math.abs(found.centralSecond[axis] / (scale ** 5 * value) - 1)).toBeLessThan(1e-8));
    }), { numRuns: 20 });
  });

  it('two parts of a surface have the whole one\'s wall between them: caps carry none', () => {
    const cage = referenceCage('torus_8x6.obj');
    const labels = Int32Array.from(facesOf(cage), (_, f) => (f % 7 < 3 ? 0 : 1));
    const split = { ...cage, groups: { names: ['a', 'b'], labels } };
    const parts = measureCage(split, { ...options('catmull-clark'), partsBy: 'group' }).parts.flatMap((part) => part.components);
    const whole = hollowOf(cage, 'catmull-clark');
    for (let power = 1; power <= 3; power++) {
      const sum = parts.reduce((total, { hollow }) => total + hollow![power - 1], 0);
      expect(Math.abs(sum - coefficient(whole, 0, power))).toBeLessThan(1e-8);
    }
  });

  it('becomes a sheet as the wall goes to nothing', () => {
    for (const scheme of ['catmull-clark', 'doo-sabin'] as const) {
      const wall = hollowOf(referenceCage('prism_5.obj'), scheme);
      const t = 1e-7;
      const [mass, ...rest] = valuesAt(wall, t);
      const { area, centroid, centralSecond } = wall.surface;
      expect(Math.abs(mass / (area * t) - 1)).toBeLessThan(1e-5);
      [...centroid].forEach((value, axis) => expect(Math.abs(rest[axis] - value)).toBeLessThan(1e-6));
      [...centralSecond].forEach((value, k) => expect(Math.abs(rest[3 + k] / t - value)).toBeLessThan(1e-5));
    }
  });
});
