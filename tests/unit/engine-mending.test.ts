import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import { facesToTurn, orientFaces } from '@/lib/engine/mesh/orient-faces';
import { weldVertices } from '@/lib/engine/mesh/weld-vertices';
import { boxPart, cageOf as cageOfParts, type TestPart } from '../support/put-cage';
import { cageOf, CATMULL_CLARK, facesOf, referenceCage } from '../support/engine-cages';

const POLYHEDRAL = { ...CATMULL_CLARK, scheme: 'polyhedral' as const };
const whole = (cage: Cage, mend: { weld?: boolean; turnFaces?: boolean } = {}) => measureCage(cage, { ...POLYHEDRAL, ...mend });
const volume = (cage: Cage, mend = {}): number => whole(cage, mend).parts[0].components.reduce((sum, component) => sum + component.solid.volume, 0);
const codes = (cage: Cage, mend = {}): string[] => whole(cage, mend).findings.map((finding) => `${finding.severity} ${finding.code}`);

/** The cage with the given faces running the other way round. */
function turned(cage: Cage, which: readonly number[]): Cage {
  return { ...cage, faceVertices: Uint32Array.from(facesOf(cage).flatMap((face, f) => (which.includes(f) ? face.slice().reverse() : face))) };
}
const reversedPart = (part: TestPart): TestPart => ({ ...part, faces: part.faces.map((face) => face.slice().reverse()) });

describe('turning faces one way and outwards', () => {
  it('names exactly the faces that were reversed, whichever they are, and gives the sound cage back', () => {
    for (const file of ['cube.obj', 'icosa.obj', 'torus_reg_quad.obj', 'frame_genus1.obj']) {
      const sound = referenceCage(file);
      const count = sound.faceStarts.length - 1;
      fc.assert(fc.property(fc.uniqueArray(fc.nat(count - 1)), (some) => {
        const which = some.sort((a, b) => a - b);
        const { cage, turned: found } = orientFaces(turned(sound, which));
        expect(Array.from(found)).toEqual(which);
        expect(volume(cage)).toBeCloseTo(volume(sound), 13);
        expect(facesToTurn(cage)).toHaveLength(0);
      }), { numRuns: 30 });
    }
  });

  it('leaves the given cage, its tags and its labels as they are', () => {
    const sound: Cage = { ...cageOfParts([boxPart('a', [0, 0, 0], [1, 1, 1]), boxPart('b', [2, 0, 0], [3, 1, 1])]), faceLines: Uint32Array.from({ length: 12 }, (_, f) => 20 + f) };
    const broken = turned(sound, [1, 8]);
    const before = Array.from(broken.faceVertices);
    const { cage } = orientFaces(broken);
    expect(Array.from(broken.faceVertices)).toEqual(before);
    expect(cage.groups).toEqual(sound.groups);
    expect(cage.faceLines).toEqual(sound.faceLines);
  });

  it('keeps a cavity a cavity, and turns a body that stands alone', () => {
    const outer = boxPart('a', [0, 0, 0], [4, 4, 4]);
    const cavity = reversedPart(boxPart('a', [1, 1, 1], [2, 2, 2]));
    expect(facesToTurn(cageOfParts([outer, cavity]))).toHaveLength(0);
    expect(volume(cageOfParts([outer, cavity]), { turnFaces: true })).toBeCloseTo(63, 12);
    // The outer box turned inwards about the cavity: only the outer one is put right.
    expect(Array.from(facesToTurn(cageOfParts([reversedPart(outer), cavity])))).toEqual([0, 1, 2, 3, 4, 5]);
    const beside = reversedPart(boxPart('a', [5, 0, 0], [6, 1, 1]));
    expect(volume(cageOfParts([outer, beside]), { turnFaces: true })).toBeCloseTo(65, 12);
  });

  it('is off unless asked for: then a problem and no number, with it the number and a note of what was turned', () => {
    const cube = cageOfParts([boxPart('a', [0, 0, 0], [1, 1, 1])]);
    const broken = turned(cube, [2]);
    expect(codes(broken)).toEqual(['problem flipped_face']);
    expect(whole(broken).parts[0].components).toEqual([]);
    expect(codes(broken, { turnFaces: true })).toEqual(['note faces_turned']);
    const { findings } = whole(broken, { turnFaces: true });
    expect(findings[0].places.map((place) => place.face)).toEqual([2]);
    expect(volume(broken, { turnFaces: true })).toBeCloseTo(1, 14);
    expect(codes(turned(cube, [0, 1, 2, 3, 4, 5]), { turnFaces: true })).toEqual(['note faces_turned']);
  });

  it('cannot put a Möbius strip right, and says so', () => {
    const n = 8;
    const points = Array.from({ length: 2 * n }, (_, i) => {
      const turn = (Math.PI * Math.floor(i / 2)) / n;
      const side = i % 2 === 0 ? 0.3 : -0.3;
      return [(2 + side * Math.cos(turn)) * Math.cos(2 * turn), (2 + side * Math.cos(turn)) * Math.sin(2 * turn), side * Math.sin(turn)];
    });
    const faces = Array.from({ length: n }, (_, i) => (i + 1 < n ? [2 * i, 2 * i + 1, 2 * i + 3, 2 * i + 2] : [2 * i, 2 * i + 1, 0, 1]));
    expect(codes(cageOf(points, faces), { turnFaces: true })).toContain('problem one_sided');
    expect(whole(cageOf(points, faces), { turnFaces: true }).parts[0].components).toEqual([]);
  });
});

describe('welding borders', () => {
  /** A box whose top stands apart with its own vertices, off by `gap`. */
  function lidded(gap: number): Cage {
    const box = boxPart('a', [0, 0, 0], [1, 1, 1], true);
    const lid: TestPart = { name: 'a', positions: [[0, 0, 1 + gap], [1, 0, 1 + gap], [1, 1, 1 + gap], [0, 1, 1 + gap]], faces: [[0, 1, 2, 3]] };
    return cageOfParts([box, lid]);
  }

  it('joins what the diagnosis names, and closes the box', () => {
    const { findings } = whole(lidded(1e-7));
    const near = findings.find((finding) => finding.code === 'near_coincident_vertices');
    expect(near).toMatchObject({ severity: 'warning', part: 'whole', count: 8 });
    expect(near?.places.map((place) => place.vertex)).toEqual([4, 5, 6, 7, 8, 9, 10, 11]);
    expect(Array.from(weldVertices(lidded(1e-7)).joined)).toEqual([8, 9, 10, 11]);
    expect(codes(lidded(1e-7), { weld: true })).toEqual(['note welded']);
    expect(whole(lidded(1e-7), { weld: true }).parts[0]).toMatchObject({ openEdges: 0, faces: 6 });
    expect(volume(lidded(1e-7), { weld: true })).toBeCloseTo(1, 14);
  });

  it('is off unless asked for, and leaves gaps beyond its tolerance', () => {
    expect(codes(lidded(1e-7))).toEqual(['problem open_border', 'warning near_coincident_vertices']);
    expect(weldVertices(lidded(0.01)).joined).toHaveLength(0);
    expect(Array.from(weldVertices(lidded(0.01), 0.02).joined)).toEqual([8, 9, 10, 11]);
  });

  it('leaves closed bodies that touch apart', () => {
    const touching = cageOfParts([boxPart('a', [0, 0, 0], [1, 1, 1]), boxPart('a', [1, 0, 0], [2, 1, 1])]);
    expect(weldVertices(touching).joined).toHaveLength(0);
  });

  it('drops faces that fall together, and carries tags along', () => {
    // A sliver beside the lid: two of its three corners are joined with those of the box's rim.
    const cage = { ...lidded(1e-7), creaseVertices: Uint32Array.from([8, 9]), creaseSharpness: Float32Array.from([3]) };
    const welded = weldVertices(cage);
    expect(Array.from(welded.cage.creaseVertices)).toEqual([4, 5]);
    const needle = cageOf([[0, 0, 0], [1, 0, 0], [1, 1e-8, 0], [0, 1, 0]], [[0, 1, 2], [0, 2, 3]]);
    expect(facesOf(weldVertices(needle).cage)).toEqual([[0, 1, 3]]);
  });
});
