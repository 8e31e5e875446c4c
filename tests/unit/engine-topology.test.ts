import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pairEdges } from '@/lib/engine/mesh/match-edges';
import { buildTopology, nextHalfEdge, validateTopology } from '@/lib/engine/mesh/topology';
import { cageOf } from '../support/engine-cages';

/** Any faces over few vertices, a hub among them that more edges meet than are searched one by one; and tags on edges that may not be there. */
const soup = fc.record({
  faces: fc.array(
    fc.oneof(fc.uniqueArray(fc.integer({ min: 0, max: 9 }), { minLength: 3, maxLength: 6 }), fc.integer({ min: 0, max: 80 }).map((i) => [40, (i % 40) + 41, ((i + 1) % 40) + 41]), fc.integer({ min: 0, max: 80 }).map((i) => [40, ((i + 1) % 40) + 41, (i % 40) + 41])),
    { minLength: 1, maxLength: 120 },
  ),
  tags: fc.array(fc.tuple(fc.integer({ min: 0, max: 42 }), fc.integer({ min: 0, max: 90 }), fc.constantFrom(0.5, 1, 3, 10)), { maxLength: 8 }),
});
const POINTS = Array.from({ length: 82 }, (_, i) => [Math.cos(i), Math.sin(2 * i), Math.sin(3 * i)]);

/** Half-edges by their edge, with what a map would make of them. */
function edgesOf(faces: readonly (readonly number[])[]): Map<string, { h: number; from: number }[]> {
  const edges = new Map<string, { h: number; from: number }[]>();
  let h = 0;
  for (const face of faces) {
    face.forEach((from, i) => {
      const to = face[(i + 1) % face.length];
      const key = `${Math.min(from, to)} ${Math.max(from, to)}`;
      edges.set(key, [...(edges.get(key) ?? []), { h: h++, from }]);
    });
  }
  return edges;
}

describe('topology', () => {
  it('of any faces is what a map of their edges says, defects and tags included', () => {
    fc.assert(
      fc.property(soup, ({ faces, tags }) => {
        const { mesh, defects } = buildTopology(cageOf(POINTS, faces, tags));
        validateTopology(mesh);
        const pair = pairEdges(mesh);
        const found = { nonManifold: new Set(defects.nonManifold), turned: new Set(defects.turned) };
        const edges = edgesOf(faces);
        for (const [key, sides] of edges) {
          const [first, second] = sides;
          const opposite = sides.length === 2 && first.from !== second.from;
          expect(sides.map(({ h }) => mesh.twin[h])).toEqual(opposite ? [second.h, first.h] : sides.map(() => -1));
          expect(sides.map(({ h }) => pair[h])).toEqual(sides.length === 2 ? [second.h, first.h] : sides.map(() => -1));
          expect(found.nonManifold.has(first.h)).toBe(sides.length > 2);
          expect(found.turned.has(first.h)).toBe(sides.length === 2 && !opposite);
          const last = tags.findLast(([a, b]) => key === `${Math.min(a, b)} ${Math.max(a, b)}`);
          const sharpness = last === undefined ? 0 : last[2] >= 10 ? Infinity : last[2];
          expect(sides.map(({ h }) => mesh.edgeSharpness[h])).toEqual(sides.map(() => sharpness));
        }
        expect(defects.nonManifold.length + defects.turned.length).toBe([...edges.values()].filter((sides) => sides.length > 2 || (sides.length === 2 && sides[0].from === sides[1].from)).length);
        expect(defects.strayCreases).toEqual(tags.flatMap(([a, b], i) => (edges.has(`${Math.min(a, b)} ${Math.max(a, b)}`) ? [] : [i])));
        for (let h = 0; h < mesh.vertexOf.length; h++) expect(mesh.faceOf[nextHalfEdge(mesh, h)]).toBe(mesh.faceOf[h]);
      }),
      { numRuns: 400 },
    );
  });
});
