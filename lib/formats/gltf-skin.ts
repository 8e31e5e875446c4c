import type { Accessor } from '@gltf-transform/core';
import type { Primitive } from './gltf-triangles';
import type { SkinWeights } from './label-by-joint';
import { isIdentity, multiply, transformPoints, type Matrix } from './matrix';
import { MeshError } from './mesh-error';

/** Joints that move together this closely are taken for unmoved: inverse bind matrices are floats. */
const UNMOVED = 1e-4;
/** Sets of four joints that a vertex may follow. */
const MOST_SETS = 8;

/** How strongly each vertex follows which joints, from all the sets of four that the primitive has; null where it has none. Errors: bad_gltf. */
export function primitiveWeights(primitive: Primitive, accessors: Accessor[], vertices: number, names: string[], path: string): SkinWeights | null {
  const sets: { joints: Accessor; weights: Accessor }[] = [];
  for (let set = 0; set < MOST_SETS; set++) {
    const [joints, weights] = [primitive.attributes[`JOINTS_${set}`], primitive.attributes[`WEIGHTS_${set}`]];
    if (joints === undefined || weights === undefined) break;
    const pair = { joints: accessors[joints], weights: accessors[weights] };
    if (pair.joints.getCount() < vertices || pair.weights.getCount() < vertices) throw new MeshError({ code: 'bad_gltf', detail: `glTF ${path}.attributes.JOINTS_${set}: expected joints and weights for ${vertices} vertices` });
    if (pair.joints.getElementSize() !== 4 || pair.weights.getElementSize() !== 4) throw new MeshError({ code: 'bad_gltf', detail: `glTF ${path}.attributes.JOINTS_${set}: expected four joints and weights a vertex` });
    sets.push(pair);
  }
  if (sets.length === 0) return null;
  const width = 4 * sets.length;
  const skin = { starts: Uint32Array.from({ length: vertices + 1 }, (_, v) => v * width), joints: new Uint32Array(vertices * width), weights: new Float64Array(vertices * width), names };
  const [joint, weight] = [[0, 0, 0, 0], [0, 0, 0, 0]];
  for (let v = 0; v < vertices; v++) {
    for (let set = 0; set < sets.length; set++) {
      sets[set].joints.getElement(v, joint);
      sets[set].weights.getElement(v, weight);
      for (let k = 0; k < 4; k++) {
        if (weight[k] > 0 && joint[k] >= names.length) throw new MeshError({ code: 'joint_out_of_range', expected: `a joint from 0 to ${names.length - 1}`, found: String(joint[k]), detail: `glTF ${path}.attributes.JOINTS_${set}: expected a joint from 0 to ${names.length - 1}, found ${joint[k]} at vertex ${v}` });
        const at = v * width + 4 * set + k;
        skin.joints[at] = weight[k] > 0 ? joint[k] : 0;
        skin.weights[at] = weight[k];
      }
    }
  }
  return skin;
}

/** What each joint does to a point of the bind pose: its inverse bind matrix, then where the joint stands. */
export function jointMatrices(joints: number[], inverseBind: Accessor | null, world: Matrix[]): Matrix[] {
  const element = new Array<number>(16).fill(0);
  return joints.map((node, i) => (inverseBind ? multiply(inverseBind.getElement(i, element), world[node]) : world[node]));
}

/**
 * Puts skinned points where the file shows them. Joints that all stand as they were bound move nothing against one another: then the points are moved as a whole,
 * or not at all, so that no rounding of the matrices gets into a cage. Else each follows its joints by its weights. True where the skin was posed so.
 */
export function poseSkin(points: Float64Array, skin: SkinWeights, matrices: Matrix[]): boolean {
  const scale = Math.max(1, ...Array.from({ length: 16 }, (_, i) => Math.abs(matrices[0][i])));
  const together = matrices.every((matrix) => Array.from({ length: 16 }, (_, i) => Math.abs(matrix[i] - matrices[0][i])).every((gap) => gap <= UNMOVED * scale));
  if (together) {
    if (!isIdentity(matrices[0], UNMOVED)) transformPoints(points, matrices[0]);
    return false;
  }
  const point = new Float64Array(3);
  for (let v = 0; 3 * v < points.length; v++) {
    const sum = [0, 0, 0];
    let total = 0;
    for (let entry = skin.starts[v]; entry < skin.starts[v + 1]; entry++) {
      const weight = skin.weights[entry];
      if (!(weight > 0)) continue;
      point.set(points.subarray(3 * v, 3 * v + 3));
      transformPoints(point, matrices[skin.joints[entry]]);
      for (let axis = 0; axis < 3; axis++) sum[axis] += weight * point[axis];
      total += weight;
    }
    if (total > 0) for (let axis = 0; axis < 3; axis++) points[3 * v + axis] = sum[axis] / total;
  }
  return true;
}
