import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BOUNDARIES, type Cage } from '@/lib/engine/cage';
import { displayMesh } from '@/lib/engine/display';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredPart, MeasureOptions } from '@/lib/engine/measured';
import { cageOf, cageSize, CATMULL_CLARK, facesOf, momentError, referenceCage, totalMoments } from '../support/engine-cages';
import { randomCage, randomTriangles } from '../support/random-cages';

const LOOP: MeasureOptions = { ...CATMULL_CLARK, scheme: 'loop' };
const DOO_SABIN: MeasureOptions = { ...CATMULL_CLARK, scheme: 'doo-sabin' };
const POLYHEDRAL: MeasureOptions = { ...CATMULL_CLARK, scheme: 'polyhedral' };
const RUNS = { numRuns: 15 };

const marked = (cage: Cage, holes: readonly number[]): Cage => ({ ...cage, holes: Uint32Array.from(holes) });
const grouped = (cage: Cage, names: string[], labels: readonly number[]): Cage => ({ ...cage, groups: { names, labels: Int32Array.from(labels) } });
const pointsOf = (cage: Cage): number[][] => Array.from({ length: cage.positions.length / 3 }, (_, v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3)));
const codes = (cage: Cage, options: MeasureOptions): string[] => measureCage(cage, options).findings.map((finding) => `${finding.severity} ${finding.code} ${finding.count}`);

/** The cage without the given faces. */
function pierced(cage: Cage, holes: readonly number[]): Cage {
  return cageOf(pointsOf(cage), facesOf(cage).filter((_, f) => !holes.includes(f)));
}

/** The cage's edges, lower vertex first, by the faces beside them. */
function edgesOf(cage: Cage): Map<string, number[]> {
  const edges = new Map<string, number[]>();
  facesOf(cage).forEach((face, f) => face.forEach((v, i) => {
    const w = face[(i + 1) % face.length];
    const key = [Math.min(v, w), Math.max(v, w)].join(' ');
    edges.set(key, [...(edges.get(key) ?? []), f]);
  }));
  return edges;
}

/** Asserts that two measurements of the same faces agree: bodies one by one, what their caps are of them, and where they are open. */
function expectAlike(found: MeasuredPart, wanted: MeasuredPart, size: number, tolerance: number, isStraight: boolean): void {
  expect([found.name, found.faces, found.maxValence, found.components.length]).toEqual([wanted.name, wanted.faces, wanted.maxValence, wanted.components.length]);
  found.components.forEach((component, i) => {
    const other = wanted.components[i];
    const alone = (one: typeof component): MeasuredPart => ({ ...found, components: [one] });
    const [own, theirs] = [totalMoments([alone(component)]), totalMoments([alone(other)])];
    const scaled = { ...theirs, volume: Math.max(Math.abs(theirs.volume), size ** 3) };
    expect(Math.abs(own.volume - theirs.volume)).toBeLessThan(tolerance * size ** 3);
    expect(momentError({ ...own, volume: scaled.volume }, scaled, size)).toBeLessThan(tolerance);
    expect(Math.abs(component.surface.area - other.surface.area)).toBeLessThan(1e-11 * size ** 2);
    expect(Math.abs(component.cage.volume - other.cage.volume)).toBeLessThan(tolerance * size ** 3);
  });
  // A cap's area is a root summed by one rule of eight nodes a piece, and a border's pieces are those of the patches on the side that gave its curve.
  expect(Math.abs(found.capAreaShare - wanted.capAreaShare)).toBeLessThan(isStraight ? 1e-12 : 1e-5);
  // Of a part that encloses next to nothing the share says nothing.
  const enclosed = Math.abs(wanted.components.reduce((sum, { solid }) => sum + solid.volume, 0));
  if (enclosed > 1e-3 * size ** 3) expect(Math.abs(found.capVolumeShare - wanted.capVolumeShare)).toBeLessThan(1e-9);
}

describe('faces that are holes', () => {
  it('leave a sharp box open there: area, cap and volume are those of its other five sides', () => {
    const cube = referenceCage('cube.obj');
    const edges = [...edgesOf(cube).keys()].map((key) => key.split(' ').map(Number));
    const sharp = { ...cube, creaseVertices: Uint32Array.from(edges.flat()), creaseSharpness: new Float32Array(edges.length).fill(10) };
    const side = Math.max(...cube.positions) - Math.min(...cube.positions);
    for (const options of [CATMULL_CLARK, POLYHEDRAL]) {
      for (let hole = 0; hole < 6; hole++) {
        const { parts, findings } = measureCage(marked(sharp, [hole]), options);
        expect(parts).toHaveLength(1);
        expect([parts[0].faces, parts[0].openEdges, parts[0].maxValence, parts[0].looksLikeSheet]).toEqual([5, 4, 3, false]);
        expect(totalMoments(parts).volume).toBeCloseTo(side ** 3, 12);
        expect(parts[0].components[0].cage.volume).toBeCloseTo(side ** 3, 12);
        expect(parts[0].components[0].surface.area).toBeCloseTo(5 * side ** 2, 11);
        expect(parts[0].capAreaShare).toBeCloseTo(1 / 6, 12);
        const open = findings.find((finding) => finding.code === 'open_border')!;
        expect([open.severity, open.count, open.part]).toEqual(['problem', 4, parts[0].name]);
        expect(open.message).toContain('4 edges have one face only, beside faces that are holes in the file');
        // Each place is an edge of the hole, at the face beside it.
        const rim = facesOf(cube)[hole];
        for (const { edge, face } of open.places) {
          expect(edge!.every((vertex) => rim.includes(vertex))).toBe(true);
          expect(face).not.toBe(hole);
          expect(facesOf(cube)[face!]).toEqual(expect.arrayContaining(edge!));
        }
        const note = findings.find((finding) => finding.code === 'hole_faces')!;
        expect([note.severity, note.count, note.part, note.places[0].face]).toEqual(['note', 1, parts[0].name, hole]);
      }
    }
  });

  it('have walls around them that end at the hole as at a real one', () => {
    // All edges sharp, the limit is the box itself, so that leaving the face out changes nothing else.
    const cube = referenceCage('cube.obj');
    const tagged = (cage: Cage): Cage => {
      const edges = [...edgesOf(cage).keys()].map((key) => key.split(' ').map(Number));
      return { ...cage, creaseVertices: Uint32Array.from(edges.flat()), creaseSharpness: new Float32Array(edges.length).fill(10), cornerVertices: Uint32Array.from(pointsOf(cage).keys()), cornerSharpness: new Float32Array(8).fill(10) };
    };
    for (const options of [CATMULL_CLARK, POLYHEDRAL]) {
      const shells = { ...options, shells: true };
      const [found] = measureCage(marked(tagged(cube), [2]), shells).parts;
      const [wanted] = measureCage(tagged(pierced(cube, [2])), shells).parts;
      expect(found.components[0].hollow).not.toBeNull();
      found.components[0].hollow!.forEach((value, i) => expect(value).toBeCloseTo(wanted.components[0].hollow![i], 10));
    }
  });

  it.each([
    ['Catmull-Clark', CATMULL_CLARK, randomCage], ['Loop', LOOP, randomTriangles], ['Doo-Sabin', DOO_SABIN, randomCage], ['polyhedral', POLYHEDRAL, randomCage],
  ] as const)('leave the others as they are beside a part of these faces, under %s', (_, options, cages) => {
    fc.assert(fc.property(cages, fc.array(fc.constantFrom(0, 0, 0, 1, 2), { minLength: 64, maxLength: 64 }), ({ cage }, drawn) => {
      const labels = Array.from({ length: cage.faceStarts.length - 1 }, (_face, f) => drawn[f % drawn.length]);
      const holes = [...labels.keys()].filter((f) => labels[f] === 2);
      fc.pre(holes.length > 0 && holes.length < labels.length);
      const apart = grouped(cage, ['a', 'b', 'z'], labels);
      const wanted = measureCage(apart, { ...options, partsBy: 'group' }).parts.filter((part) => part.name !== 'z');
      // What the file says of the holes' groups does not matter.
      const found = measureCage(marked(grouped(cage, ['a', 'b', 'z'], labels.map((label) => (label === 2 ? 0 : label))), holes), { ...options, partsBy: 'group' });
      expect(found.parts.map((part) => part.name)).toEqual(wanted.map((part) => part.name));
      found.parts.forEach((part, i) => expectAlike(part, wanted[i], cageSize(cage), 1e-14, options === POLYHEDRAL));
      const rims = [...edgesOf(cage).values()].filter(([one, other]) => (labels[one] === 2) !== (labels[other] === 2));
      expect(found.parts.reduce((sum, part) => sum + part.openEdges, 0)).toBe(rims.length);
      for (const part of found.parts) {
        const own = rims.filter((faces) => faces.some((f) => labels[f] !== 2 && ['a', 'b'][labels[f]] === part.name)).length;
        expect(part.openEdges).toBe(own);
        expect(found.findings.find((finding) => finding.code === 'open_border' && finding.part === part.name)?.count ?? 0).toBe(own);
      }
    }), RUNS);
  });

  it('are as good as faces that are not there where nothing is refined, wherever they touch the rim', () => {
    const plate = (heights: readonly number[]): Cage => cageOf(
      Array.from({ length: 25 }, (_, v) => [v % 5, Math.floor(v / 5), heights[v]]),
      Array.from({ length: 16 }, (_, f) => [0, 1, 6, 5].map((step) => Math.floor(f / 4) * 5 + (f % 4) + step)),
    );
    let compared = 0;
    fc.assert(fc.property(fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 25, maxLength: 25 }), fc.uniqueArray(fc.nat(15), { minLength: 1, maxLength: 6 }), (heights, holes) => {
      const cage = plate(heights);
      const open = measureCage(pierced(cage, holes), POLYHEDRAL);
      fc.pre(!open.findings.some((finding) => finding.code === 'non_manifold_vertex'));
      compared++;
      const found = measureCage(marked(cage, holes), POLYHEDRAL);
      expect(found.parts).toHaveLength(1);
      const { components, openEdges, capAreaShare } = found.parts[0];
      expect(openEdges).toBe(open.parts[0].openEdges);
      expect(Math.abs(capAreaShare - open.parts[0].capAreaShare)).toBeLessThan(1e-13);
      expect(components).toHaveLength(open.parts[0].components.length);
      components.forEach((component, i) => {
        const other = open.parts[0].components[i];
        expect(Math.abs(component.solid.volume - other.solid.volume)).toBeLessThan(1e-12);
        expect(Math.abs(component.surface.area - other.surface.area)).toBeLessThan(1e-12);
      });
    }), { numRuns: 150 });
    expect(compared).toBeGreaterThan(50);
  });

  it('make no part of their own, whatever makes the parts', () => {
    const cube = referenceCage('cube.obj');
    const two = cageOf([...pointsOf(cube), ...pointsOf(cube).map(([x, y, z]) => [x + 9, y, z])], [...facesOf(cube), ...facesOf(cube).map((face) => face.map((v) => v + 8))]);
    const first = [0, 1, 2, 3, 4, 5];
    const labels = { names: ['one', 'two'], labels: Int32Array.from({ length: 12 }, (_, f) => (f < 6 ? 0 : 1)) };
    const holed = { ...marked(two, first), groups: labels, objects: labels, materials: labels, joints: labels };
    for (const partsBy of ['group', 'object', 'material', 'joint'] as const) expect(measureCage(holed, { ...CATMULL_CLARK, partsBy }).parts.map((part) => part.name)).toEqual(['two']);
    expect(measureCage(holed, { ...CATMULL_CLARK, partsBy: 'piece' }).parts.map((part) => [part.name, part.faces])).toEqual([['piece 1', 6]]);
    expect(measureCage(holed, CATMULL_CLARK).parts.map((part) => [part.name, part.faces, part.openEdges])).toEqual([['whole', 6, 0]]);
    expect(codes(holed, CATMULL_CLARK)).toEqual(['note hole_faces 6']);
    expect(momentError(totalMoments(measureCage(holed, CATMULL_CLARK).parts), totalMoments(measureCage({ ...two, holes: undefined }, { ...CATMULL_CLARK, partsBy: 'piece' }).parts.slice(1)), 10)).toBeLessThan(1e-14);
    // A face named twice is one hole; a cage of holes alone has no parts.
    expect(codes(marked(two, [...first, 0, 0]), CATMULL_CLARK)).toEqual(['note hole_faces 6']);
    expect(measureCage(marked(cube, first), CATMULL_CLARK).parts).toEqual([]);
  });

  it('fall apart into bodies of one part where they cut it through', () => {
    const cube = referenceCage('cube.obj');
    const faces = facesOf(cube);
    const opposite = faces.findIndex((face) => face.every((v) => !faces[0].includes(v)));
    const belt = faces.map((_, f) => f).filter((f) => f !== 0 && f !== opposite);
    const [part] = measureCage(marked(cube, belt), CATMULL_CLARK).parts;
    expect([part.components.length, part.faces, part.openEdges, part.looksLikeSheet]).toEqual([2, 2, 8, true]);
  });

  it('are drawn by nobody', () => {
    const cube = referenceCage('cube.obj');
    for (const [options, level] of [[POLYHEDRAL, 0], [CATMULL_CLARK, 2], [DOO_SABIN, 3]] as const) {
      const group = grouped(cube, ['a', 'z'], [0, 1, 0, 0, 1, 0]);
      const mesh = displayMesh(marked(cube, [1, 4]), options, level);
      const wanted = displayMesh(group, { ...options, partsBy: 'group' }, level);
      expect(mesh.parts).toEqual([{ ...wanted.parts[0], name: 'whole' }]);
      expect(Array.from(mesh.indices)).toEqual(Array.from(wanted.indices.subarray(0, wanted.parts[0].indexCount)));
      expect(Array.from(mesh.positions)).toEqual(Array.from(wanted.positions.subarray(0, 3 * wanted.parts[0].vertexCount)));
      expect(Array.from(mesh.normals)).toEqual(Array.from(wanted.normals.subarray(0, 3 * wanted.parts[0].vertexCount)));
    }
    expect(displayMesh(marked(cube, [1, 4]), POLYHEDRAL, 0).indices).toHaveLength(3 * 8);
  });

  it('are passed through without touching anything', () => {
    const box = (low: readonly number[], high: readonly number[]): number[][] => [0, 1, 2, 3, 4, 5, 6, 7].map((corner) => [0, 1, 2].map((axis) => ((corner >> axis) & 1 ? high[axis] : low[axis])));
    const sides = [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]];
    // A stick through the top of a box: it crosses that face alone.
    const cage = cageOf([...box([0, 0, 0], [3, 3, 3]), ...box([1, 1, 2], [2, 2, 5])], [...sides, ...sides.map((face) => face.map((v) => v + 8))]);
    const [tagged, plain] = [marked(cage, [1]), cage].map((one) => measureCage(one, { ...POLYHEDRAL, partsBy: 'piece' }).findings.map((finding) => finding.code));
    expect(plain).toContain('overlap');
    expect(tagged).not.toContain('overlap');
    // Through a side that is none, it is found.
    expect(measureCage(marked(cage, [4]), { ...POLYHEDRAL, partsBy: 'piece' }).findings.map((finding) => finding.code)).toContain('overlap');
  });

  it('stay holes when the cage is mended', () => {
    const cube = referenceCage('cube.obj');
    const faces = facesOf(cube);
    const flipped = marked(cageOf(pointsOf(cube), faces.map((face, f) => (f === 3 ? face.slice().reverse() : face))), [4]);
    const wanted = measureCage(marked(cube, [4]), CATMULL_CLARK).parts;
    expect(momentError(totalMoments(measureCage(flipped, { ...CATMULL_CLARK, turnFaces: true }).parts), totalMoments(wanted), 2)).toBeLessThan(1e-14);
    // A triangle that welding makes nothing of stands before the cube's faces, whose numbers then move.
    const far = [[50, 0, 0], [50, 0, 0], [50, 1, 0]];
    const sliver = cageOf([...far, ...pointsOf(cube)], [[0, 1, 2], ...faces.map((face) => face.map((v) => v + 3))]);
    const welded = measureCage(marked(sliver, [5]), { ...CATMULL_CLARK, weld: true });
    expect(welded.parts[0].openEdges).toBe(4);
    expect(momentError(totalMoments(welded.parts), totalMoments(wanted), 2)).toBeLessThan(1e-14);
  });

  it.each(BOUNDARIES)('that are broken block the part beside them, under its name (%s)', (boundary) => {
    const cube = referenceCage('cube.obj');
    const faces = facesOf(cube);
    const broken = marked(cageOf(pointsOf(cube), faces.map((face, f) => (f === 2 ? [face[0], face[1], face[2], face[1]] : face))), [2]);
    const { parts, findings } = measureCage(broken, { ...CATMULL_CLARK, boundary });
    expect(parts.map((part) => part.components.length)).toEqual([0]);
    const problem = findings.find((finding) => finding.code === 'degenerate_face')!;
    expect([problem.severity, problem.part, problem.places[0].face]).toEqual(['problem', 'whole', 2]);
  });
});
