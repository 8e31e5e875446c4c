import fc from 'fast-check';
import type { Cage } from '@/lib/engine/cage';
import type { MeasureOptions } from '@/lib/engine/measured';
import { buildTopology, nextHalfEdge } from '@/lib/engine/mesh/topology';
import { refineAround } from '@/lib/engine/schemes/catmull-clark-refine';
import { dooSabinCage } from '@/lib/engine/schemes/doo-sabin-mesh';
import { refineDooSabin } from '@/lib/engine/schemes/doo-sabin-refine';
import { levelZero, type LevelMesh } from '@/lib/engine/schemes/level-mesh';
import { refineTriangles } from '@/lib/engine/schemes/loop-refine';
import { facesOf, referenceCage } from './engine-cages';

/** Closed manifold cages: genus 0 and 1, quads, triangles and n-gons, valences 3 to 6. */
const BASES = ['cube.obj', 'octa.obj', 'prism_5.obj', 'pyramid_quad.obj', 'icosa.obj', 'torus_reg_quad.obj', 'frame_genus1.obj', 'cube_tri.obj'];

export interface RandomCage {
  cage: Cage;
  /** What was drawn, for messages. */
  base: string;
}

/** Sharpness below, at and beyond the steps of the rules. */
const anySharpness = fc.constantFrom(0.4, 1, 1.7, 2.5, 10);

/** A base cage with moved vertices and tags on some of its edges and vertices. */
export const randomCage: fc.Arbitrary<RandomCage> = cagesFrom(BASES);

/** The same over closed cages of triangles, valences 3 to 6, for Loop. */
export const randomTriangles: fc.Arbitrary<RandomCage> = cagesFrom(['tetra.obj', 'octa.obj', 'icosa.obj', 'cube_tri.obj', 'bipyramid_5.obj', 'torus_reg_tri.obj']);

function cagesFrom(bases: readonly string[]): fc.Arbitrary<RandomCage> {
  return fc
    .record({
      base: fc.constantFrom(...bases),
      shifts: fc.array(fc.double({ min: -0.1, max: 0.1, noNaN: true }), { minLength: 24, maxLength: 24 }),
      creases: fc.array(fc.tuple(fc.nat(200), anySharpness), { maxLength: 6 }),
      corners: fc.array(fc.tuple(fc.nat(200), anySharpness), { maxLength: 2 }),
    })
    .map(({ base, shifts, creases, corners }) => {
      const plain = referenceCage(base);
      const faces = facesOf(plain);
      const edges = faces.flatMap((face) => face.map((v, i): [number, number] => [v, face[(i + 1) % face.length]])).filter(([a, b]) => a < b);
      const tagged = creases.map(([i, sharpness]) => [...edges[i % edges.length], sharpness] as const);
      const cage: Cage = {
        ...plain,
        positions: plain.positions.map((value, i) => value + shifts[(7 * i) % shifts.length]),
        creaseVertices: Uint32Array.from(tagged.flatMap(([a, b]) => [a, b])),
        creaseSharpness: Float32Array.from(tagged.map(([, , sharpness]) => sharpness)),
        cornerVertices: Uint32Array.from(corners.map(([i]) => i % (plain.positions.length / 3))),
        cornerSharpness: Float32Array.from(corners.map(([, sharpness]) => sharpness)),
      };
      return { cage, base };
    });
}

function refined(cage: LevelMesh, options: MeasureOptions): LevelMesh {
  if (options.scheme === 'loop') return refineTriangles(cage, options);
  if (options.scheme === 'catmull-clark') return refineAround(cage, options);
  const all = new Uint8Array(cage.vertices).fill(1);
  return refineDooSabin(dooSabinCage(cage, options.boundary), all, all);
}

/** The cage after one refinement by the scheme's rule, its tags decayed. */
export function refinedOnce(cage: Cage, options: MeasureOptions): Cage {
  const { mesh } = buildTopology(cage);
  const coarse = levelZero(mesh, cage.positions, new Int32Array(mesh.faces), new Uint8Array(1), options.boundary);
  const fine = refined(coarse, options);
  const creases: number[] = [];
  const sharpness: number[] = [];
  for (let h = 0; h < fine.twin.length; h++) {
    if (!(fine.edgeSharpness[h] > 0)) continue;
    creases.push(fine.vertexOf[h], fine.vertexOf[nextHalfEdge(fine, h)]);
    sharpness.push(Math.min(10, fine.edgeSharpness[h]));
  }
  const corners = Array.from(fine.vertexSharpness.keys()).filter((v) => fine.vertexSharpness[v] > 0);
  return {
    ...cage,
    positions: fine.positions,
    faceStarts: Uint32Array.from(fine.starts),
    faceVertices: Uint32Array.from(fine.vertexOf),
    creaseVertices: Uint32Array.from(creases),
    creaseSharpness: Float32Array.from(sharpness),
    cornerVertices: Uint32Array.from(corners),
    cornerSharpness: Float32Array.from(corners.map((v) => Math.min(10, fine.vertexSharpness[v]))),
  };
}

/** Children of face f of the refined cage take its label: corner by corner, as the refinement orders them. */
export function refinedLabels(cage: Cage, labels: Int32Array): Int32Array {
  return Int32Array.from(facesOf(cage).flatMap((face, f) => face.map(() => labels[f])));
}

/** The cage with every face turned round. */
export function reversed(cage: Cage): Cage {
  return { ...cage, faceVertices: Uint32Array.from(facesOf(cage).flatMap((face) => face.slice().reverse())) };
}
