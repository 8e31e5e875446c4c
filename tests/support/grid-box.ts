/** A closed box of nx × ny × nz quads a side: its surface points on the lattice, its faces counter-clockwise seen from outside, and the vertex at a lattice point. */
export interface GridBox {
  positions: number[][];
  faces: number[][];
  vertexAt: (i: number, j: number, k: number) => number;
}

export function gridBox(size: readonly [number, number, number], place: (i: number, j: number, k: number) => number[]): GridBox {
  const ids = new Map<string, number>();
  const positions: number[][] = [];
  const faces: number[][] = [];
  const vertexAt = (i: number, j: number, k: number): number => {
    const key = `${i} ${j} ${k}`;
    const known = ids.get(key);
    if (known !== undefined) return known;
    ids.set(key, positions.length);
    positions.push(place(i, j, k));
    return positions.length - 1;
  };
  for (let axis = 0; axis < 3; axis++) {
    const [u, v] = [(axis + 1) % 3, (axis + 2) % 3];
    for (let a = 0; a < size[u]; a++) {
      for (let b = 0; b < size[v]; b++) {
        for (const far of [false, true]) {
          const corners = [[a, b], [a + 1, b], [a + 1, b + 1], [a, b + 1]].map(([p, q]) => {
            const at = [0, 0, 0];
            at[axis] = far ? size[axis] : 0;
            at[u] = p;
            at[v] = q;
            return vertexAt(at[0], at[1], at[2]);
          });
          faces.push(far ? corners : corners.reverse());
        }
      }
    }
  }
  return { positions, faces, vertexAt };
}
