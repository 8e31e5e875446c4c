import { expect, test } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import type { MeasureOptions } from '@/lib/engine/measured';
import { buildTopology, nextHalfEdge } from '@/lib/engine/mesh/topology';
import { cutOut } from '@/lib/engine/schemes/cut-out';
import { refineLimit, startLimit, type LimitLevel } from '@/lib/engine/schemes/limit-triangles';
import { cageOf } from '../support/put-cage';

/** A torus of n × n quads, some of them cut in two or all, with a semi-sharp crease along one of its circles. */
function torus(n: number, cut: (i: number, j: number) => boolean): Cage {
  const positions: [number, number, number][] = [];
  const faces: number[][] = [];
  const at = (i: number, j: number): number => (i % n) * n + (j % n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const [a, b] = [(2 * Math.PI * i) / n, (2 * Math.PI * j) / n];
      positions.push([(3 + Math.cos(b)) * Math.cos(a), (3 + Math.cos(b)) * Math.sin(a), Math.sin(b)]);
      const [p, q, r, s] = [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)];
      if (cut(i, j)) faces.push([p, q, r], [p, r, s]);
      else faces.push([p, q, r, s]);
    }
  }
  const circle = Array.from({ length: n }, (_, i) => [at(i, 0), at(i + 1, 0)]);
  return { ...cageOf([{ name: 'torus', positions, faces }]), creaseVertices: Uint32Array.from(circle.flat()), creaseSharpness: new Float32Array(n).fill(1.5) };
}

/** Around each side of the live pieces of a face of the cage: where it starts, its sharpness, and the far corners of what lies across. */
function around(level: LimitLevel, face: number): number[] {
  const seen: number[] = [];
  const place = (h: number): void => void seen.push(...level.positions.subarray(3 * level.vertexOf[h], 3 * level.vertexOf[h] + 3));
  for (let h = 0; h < level.vertexOf.length; h++) {
    if (level.live[level.faceOf[h]] === 0 || level.bodyOf[level.faceOf[h]] !== face) continue;
    place(h);
    seen.push(level.edgeSharpness[h], level.vertexSharpness[level.vertexOf[h]]);
    const across = nextHalfEdge(level, nextHalfEdge(level, level.twin[h]));
    place(across);
    place(nextHalfEdge(level, across));
  }
  return seen;
}

const CASES = [
  ['catmull-clark', 'uniform', (i: number, j: number) => (i + 2 * j) % 5 === 0],
  ['catmull-clark', 'chaikin', (i: number, j: number) => (i + 2 * j) % 5 === 0],
  ['loop', 'uniform', () => true],
  ['loop', 'chaikin', () => true],
] as const;

test.each(CASES)('%s, %s creasing: a face refined for itself is refined as in the whole cage, to the last bit', (scheme, creasing, cut) => {
  const cage = torus(14, cut);
  const options: MeasureOptions = { scheme, creasing, boundary: 'edge-and-corner', triangles: 'catmark', partsBy: 'whole' };
  const { mesh } = buildTopology(cage);
  const whole = startLimit(mesh, cage.positions, options);
  for (let face = 0; face < mesh.faces; face += 3) {
    const alone = { ...whole, live: Uint8Array.from({ length: mesh.faces }, (_, other) => (other === face ? 1 : 0)) };
    const wanted = new Uint8Array(mesh.vertices);
    for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) wanted[mesh.vertexOf[h]] = 1;
    // Or nothing would be cut out, and the test would compare the whole with itself.
    expect(cutOut(alone, wanted).mesh.faces).toBeLessThan(mesh.faces / 4);
    const [one, all] = [alone, whole].map((level) => refineLimit(refineLimit(level, options), options));
    const seen = around(one, face);
    expect(seen.length).toBeGreaterThan(0);
    expect(seen).toEqual(around(all, face));
  }
});
