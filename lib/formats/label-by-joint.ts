import type { FaceLabels } from '../engine/cage';

/** How much each vertex follows which joints: vertex v has the entries `starts[v] .. starts[v + 1]`. */
export interface SkinWeights {
  /** Length V + 1. */
  starts: Uint32Array;
  /** Joint of each entry, an index into `names`. */
  joints: Uint32Array;
  weights: Float64Array;
  names: string[];
}

/**
 * Gives each face the joint that its corners follow most, by the sum of their weights; of equal ones the first in the list of joints.
 * A face whose corners have no weight has no label. Null where no face has one.
 */
export function labelByJoint(faceStarts: Uint32Array, faceVertices: Uint32Array, skin: SkinWeights): FaceLabels | null {
  const faces = faceStarts.length - 1;
  const labels = new Int32Array(faces).fill(-1);
  const sums = new Float64Array(skin.names.length);
  let found = false;
  for (let face = 0; face < faces; face++) {
    let best = -1;
    for (const pass of ['add', 'choose', 'clear']) {
      for (let corner = faceStarts[face]; corner < faceStarts[face + 1]; corner++) {
        const vertex = faceVertices[corner];
        for (let entry = skin.starts[vertex]; entry < skin.starts[vertex + 1]; entry++) {
          const joint = skin.joints[entry];
          if (pass === 'add') sums[joint] += Math.max(0, skin.weights[entry]);
          else if (pass === 'clear') sums[joint] = 0;
          else if (sums[joint] > 0 && (best < 0 || sums[joint] > sums[best] || (sums[joint] === sums[best] && joint < best))) best = joint;
        }
      }
    }
    labels[face] = best;
    found ||= best >= 0;
  }
  return found ? { names: skin.names, labels } : null;
}
