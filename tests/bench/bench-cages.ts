import type { Cage } from '@/lib/engine/cage';

function cage(positions: Float64Array, faceStarts: Uint32Array, faceVertices: Uint32Array): Cage {
  return {
    positions, faceStarts, faceVertices, groups: null, objects: null, materials: null, joints: null,
    creaseVertices: new Uint32Array(0), creaseSharpness: new Float32Array(0), cornerVertices: new Uint32Array(0), cornerSharpness: new Float32Array(0),
    boundary: null, faceLines: null, metresPerUnit: null, upAxis: null, warnings: [],
  };
}

/** How a torus of n × n quads is cut: not at all, one quad in a thousand, in a hundred or each of them in two, or each in two along diagonals that take turns. */
export const CUTS = ['none', 'few', 'some', 'all', 'alternating'] as const;
export type Cut = (typeof CUTS)[number];

/** Every how manyth quad is cut, each way. */
const SPACING: Readonly<Record<Cut, number>> = { none: Infinity, few: 32, some: 10, all: 1, alternating: 1 };

/**
 * A torus of n × n quads (n even), every vertex regular to Catmull-Clark and Doo-Sabin until quads are cut in two. With `all` every vertex is regular to
 * Loop and none to the others; with `alternating` the valences are 4 and 8, so that none is to anybody.
 */
export function torus(n: number, cut: Cut): Cage {
  const positions = new Float64Array(3 * n * n);
  const spacing = SPACING[cut];
  const starts = [0];
  const corners: number[] = [];
  const add = (...face: number[]): void => {
    for (const vertex of face) corners.push(vertex);
    starts.push(corners.length);
  };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const [a, b] = [(2 * Math.PI * i) / n, (2 * Math.PI * j) / n];
      positions.set([(3 + Math.cos(b)) * Math.cos(a), (3 + Math.cos(b)) * Math.sin(a), Math.sin(b)], 3 * (i * n + j));
      const at = (x: number, y: number): number => (x % n) * n + (y % n);
      const [p, q, r, s] = [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)];
      if (cut === 'none' || i % spacing > 0 || j % spacing > 0) add(p, q, r, s);
      else if (cut === 'alternating' && (i + j) % 2 === 1) {
        add(p, q, s);
        add(q, r, s);
      } else {
        add(p, q, r);
        add(p, r, s);
      }
    }
  }
  return cage(positions, Uint32Array.from(starts), Uint32Array.from(corners));
}

/** A cage as the bytes of an OBJ file, coordinates with all digits. */
export function objBytes({ positions, faceStarts, faceVertices }: Cage): Uint8Array {
  const pieces: Buffer[] = [];
  let lines: string[] = [];
  const put = (line: string): void => {
    lines.push(line);
    if (lines.length < 50_000) return;
    pieces.push(Buffer.from(`${lines.join('\n')}\n`));
    lines = [];
  };
  for (let v = 0; v < positions.length; v += 3) put(`v ${positions[v]} ${positions[v + 1]} ${positions[v + 2]}`);
  for (let face = 0; face + 1 < faceStarts.length; face++) put(`f ${Array.from(faceVertices.subarray(faceStarts[face], faceStarts[face + 1]), (vertex) => vertex + 1).join(' ')}`);
  pieces.push(Buffer.from(`${lines.join('\n')}\n`));
  return Buffer.concat(pieces);
}
