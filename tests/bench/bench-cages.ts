import type { Cage } from '@/lib/engine/cage';

function cage(positions: Float64Array, faceStarts: Uint32Array, faceVertices: Uint32Array): Cage {
  return {
    positions, faceStarts, faceVertices, groups: null, objects: null, materials: null, joints: null,
    creaseVertices: new Uint32Array(0), creaseSharpness: new Float32Array(0), cornerVertices: new Uint32Array(0), cornerSharpness: new Float32Array(0),
    boundary: null, faceLines: null, metresPerUnit: null, upAxis: null, warnings: [],
  };
}

/** A torus of n × m quads, every vertex regular. */
export function quadTorus(n: number, m: number): Cage {
  const positions = new Float64Array(3 * n * m);
  const faces = new Uint32Array(4 * n * m);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < m; j++) {
      const [a, b] = [(2 * Math.PI * i) / n, (2 * Math.PI * j) / m];
      positions.set([(3 + Math.cos(b)) * Math.cos(a), (3 + Math.cos(b)) * Math.sin(a), Math.sin(b)], 3 * (i * m + j));
      const at = (x: number, y: number): number => (x % n) * m + (y % m);
      faces.set([at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)], 4 * (i * m + j));
    }
  }
  return cage(positions, Uint32Array.from({ length: n * m + 1 }, (_, f) => 4 * f), faces);
}

/** The same with each quad cut in two: every vertex and every face is extraordinary to Catmull-Clark. */
export function triangleTorus(n: number, m: number): Cage {
  const quads = quadTorus(n, m);
  const faces = new Uint32Array(6 * n * m);
  for (let f = 0; f < n * m; f++) {
    const [a, b, c, d] = quads.faceVertices.subarray(4 * f, 4 * f + 4);
    faces.set([a, b, c, a, c, d], 6 * f);
  }
  return cage(quads.positions, Uint32Array.from({ length: 2 * n * m + 1 }, (_, f) => 3 * f), faces);
}
