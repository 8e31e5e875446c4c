import { growingInt32, growingUint32 } from './growing-array';
import { weldExact } from './weld-exact';

/** Triangles over welded vertices. */
export interface WeldedTriangles {
  positions: Float64Array;
  faceVertices: Uint32Array;
  /** The number that each triangle had before those without area at their corners were left out. */
  faceOf: Int32Array;
  /** How many had two corners in one place. */
  collapsed: number;
}

/** Welds equal vertices and leaves out triangles of which two corners fall together. `corners` names vertices three a triangle. */
export function weldTriangles(positions: Float64Array, corners: Uint32Array): WeldedTriangles {
  const welded = weldExact(positions);
  const faceVertices = growingUint32();
  const faceOf = growingInt32();
  for (let face = 0; 3 * face < corners.length; face++) {
    const a = welded.into[corners[3 * face]];
    const b = welded.into[corners[3 * face + 1]];
    const c = welded.into[corners[3 * face + 2]];
    if (a === b || b === c || c === a) continue;
    faceVertices.push(a);
    faceVertices.push(b);
    faceVertices.push(c);
    faceOf.push(face);
  }
  return { positions: welded.positions, faceVertices: faceVertices.take(), faceOf: faceOf.take(), collapsed: corners.length / 3 - faceOf.length };
}
