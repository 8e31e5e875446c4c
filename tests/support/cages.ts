/** A cube of the given edge with its lowest corner at `at`, as OBJ text in one group; outward faces. */
export function cubeObj(options: { size?: number; at?: [number, number, number]; group?: string; base?: number } = {}): string {
  const { size = 2, at = [0, 0, 0], group = 'body', base = 0 } = options;
  const corners = [0, 1, 2, 3, 4, 5, 6, 7].map((n) => [n & 1, (n >> 1) & 1, n >> 2].map((bit, axis) => at[axis] + bit * size));
  const faces = [[1, 3, 4, 2], [5, 6, 8, 7], [1, 2, 6, 5], [3, 7, 8, 4], [1, 5, 7, 3], [2, 4, 8, 6]];
  return [`g ${group}`, ...corners.map((corner) => `v ${corner.join(' ')}`), ...faces.map((face) => `f ${face.map((corner) => corner + base).join(' ')}`), ''].join('\n');
}

/** Several cubes, each a group of its own. */
export function cubesObj(groups: readonly string[], size = 2): string {
  return groups.map((group, index) => cubeObj({ size, at: [index * size * 2, 0, 0], group, base: index * 8 })).join('\n');
}

/** A face that names a vertex which is not there, at line 10 column 11. */
export const brokenObj = `${cubeObj().split('\n').slice(0, 9).join('\n')}\nf 1 3 4 2 99\n`;

/** A closed quad box with `steps` × `steps` quads a side: 6 steps² faces. */
export function gridBoxObj(steps: number, size = 2): string {
  const index = new Map<string, number>();
  const lines: string[] = [];
  const vertex = (x: number, y: number, z: number): number => {
    const key = `${x} ${y} ${z}`;
    let found = index.get(key);
    if (found === undefined) {
      index.set(key, (found = index.size + 1));
      lines.push(`v ${(x * size) / steps} ${(y * size) / steps} ${(z * size) / steps}`);
    }
    return found;
  };
  const faces: string[] = [];
  for (let a = 0; a < steps; a++) {
    for (let b = 0; b < steps; b++) {
      const side = (corner: (u: number, v: number) => number, isFlipped: boolean) => {
        const ring = [corner(a, b), corner(a + 1, b), corner(a + 1, b + 1), corner(a, b + 1)];
        faces.push(`f ${(isFlipped ? ring.reverse() : ring).join(' ')}`);
      };
      side((u, v) => vertex(u, v, 0), true);
      side((u, v) => vertex(u, v, steps), false);
      side((u, v) => vertex(0, u, v), true);
      side((u, v) => vertex(steps, u, v), false);
      side((u, v) => vertex(v, 0, u), true);
      side((u, v) => vertex(v, steps, u), false);
    }
  }
  return [...lines, 'g body', ...faces, ''].join('\n');
}

/** Boxes as groups of one OBJ, each from the origin to its corner, side by side along x, 100 apart. */
export function boxesObj(boxes: Record<string, readonly [number, number, number]>): string {
  const lines: string[] = [];
  Object.entries(boxes).forEach(([name, [x, y, z]], index) => {
    const from = 100 * index;
    const corners = [[0, 0, 0], [x, 0, 0], [x, y, 0], [0, y, 0], [0, 0, z], [x, 0, z], [x, y, z], [0, y, z]];
    lines.push(`g ${name}`, ...corners.map(([a, b, c]) => `v ${from + a} ${b} ${c}`));
    for (const face of [[1, 4, 3, 2], [1, 2, 6, 5], [2, 3, 7, 6], [3, 4, 8, 7], [4, 1, 5, 8], [5, 6, 7, 8]]) lines.push(`f ${face.map((vertex) => 8 * index + vertex).join(' ')}`);
  });
  return `${lines.join('\n')}\n`;
}
