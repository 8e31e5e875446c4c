import type { Cage, FaceLabels } from '../engine/cage';
import { distinctNames, shortNames } from './distinct-names';
import { labelByJoint, type SkinWeights } from './label-by-joint';
import { MeshError } from './mesh-error';
import { MESH_LIMITS } from './mesh-limits';
import { numbersOf, textOf, textsOf, type UsdPrim } from './usd-prim';

/** Materials bind to subsets for shading; other families cut the mesh up for other ends. */
const SHADING_FAMILY = 'materialBind';

export interface UsdSubset {
  name: string;
  family: string;
  faces: ArrayLike<number>;
  material: string | null;
}

/** The last name of a path. */
export function nameOfPath(path: string): string {
  return path.slice(path.lastIndexOf('/') + 1);
}

/** The face subsets below a mesh. Errors: bad_index with the subset's path. */
export function readSubsets(mesh: UsdPrim, faces: number, path: string): UsdSubset[] {
  return mesh.children
    .filter((child) => child.typeName === 'GeomSubset' && child.active && (textOf(child, 'elementType') ?? 'face') === 'face')
    .map((child) => {
      const indices = numbersOf(child, 'indices') ?? [];
      for (let i = 0; i < indices.length; i++) {
        if (!Number.isInteger(indices[i]) || indices[i] < 0 || indices[i] >= faces) {
          throw new MeshError({ code: 'bad_index', expected: `faces from 0 to ${faces - 1}`, found: String(indices[i]), detail: `subset ${path.slice(0, 200)}/${child.name}: expected faces from 0 to ${faces - 1}, found ${indices[i]} at place ${i}` });
        }
      }
      const bound = child.relationships.get('material:binding')?.[0];
      return { name: child.name, family: textOf(child, 'familyName') ?? '', faces: indices, material: bound === undefined ? null : nameOfPath(bound) };
    });
}

/** Faces by the first subset that has them; the rest is `rest`. */
function labelBySubset(subsets: { name: string; faces: ArrayLike<number> }[], faces: number, rest: string | null): FaceLabels {
  const names = [...subsets.map((subset) => subset.name), ...(rest === null ? [] : [rest])];
  const labels = new Int32Array(faces).fill(rest === null ? -1 : names.length - 1);
  const taken = new Uint8Array(faces);
  subsets.forEach((subset, s) => {
    for (let i = 0; i < subset.faces.length; i++) {
      if (taken[subset.faces[i]] === 1) continue;
      taken[subset.faces[i]] = 1;
      labels[subset.faces[i]] = s;
    }
  });
  return { names, labels };
}

/** Groups: the subsets that are no matter of shading, else those that are; faces in none have the mesh's name. */
export function groupLabels(subsets: UsdSubset[], faces: number, mesh: string): FaceLabels {
  const cuts = subsets.filter((subset) => subset.family !== SHADING_FAMILY);
  return labelBySubset(cuts.length > 0 ? cuts : subsets, faces, mesh);
}

/** Materials: that of a face's subset, else the mesh's own or the one that it inherits. */
export function materialLabels(subsets: UsdSubset[], faces: number, bound: string | null): FaceLabels | null {
  const shaded = subsets.filter((subset) => subset.material !== null).map((subset) => ({ name: subset.material!, faces: subset.faces }));
  return shaded.length === 0 && bound === null ? null : labelBySubset(shaded, faces, bound);
}

/**
 * Faces by dominant skin joint, from the mesh's `primvars:skel` weights: so many a vertex as their elementSize says, or one set for the whole mesh. `joints` are
 * the names in force, as paths; null where there are no weights. Errors: bad_count, joint_out_of_range with the prim's path.
 */
export function jointLabels(mesh: UsdPrim, cage: Cage, joints: string[], path: string): FaceLabels | null {
  const [given, weights] = [numbersOf(mesh, 'primvars:skel:jointIndices'), numbersOf(mesh, 'primvars:skel:jointWeights')];
  if (given === null || weights === null || given.length === 0) return null;
  const vertices = cage.positions.length / 3;
  const authored = mesh.attributes.get('primvars:skel:jointIndices')!.elementSize;
  const rigid = given.length < vertices || (given.length !== authored * vertices && given.length % vertices !== 0);
  const width = rigid ? given.length : Math.max(1, given.length / vertices);
  if (weights.length !== given.length || !Number.isInteger(width)) {
    throw new MeshError({ code: 'bad_count', detail: `mesh ${path.slice(0, 200)}: expected as many jointWeights as jointIndices, so many a vertex, found ${given.length} and ${weights.length} for ${vertices} vertices` });
  }
  if (rigid && width > authored) throw new MeshError({ code: 'bad_count', detail: `mesh ${path.slice(0, 200)}: expected ${authored} jointIndices a vertex for ${vertices} vertices, found ${given.length}` });
  if (width > MESH_LIMITS.nameLength) throw new MeshError({ code: 'bad_count', detail: `mesh ${path.slice(0, 200)}: expected at most ${MESH_LIMITS.nameLength} joints a vertex, found ${width}` });
  let highest = 0;
  for (let i = 0; i < given.length; i++) {
    const bound = joints.length > 0 ? joints.length : MESH_LIMITS.names;
    if (!Number.isInteger(given[i]) || given[i] < 0 || given[i] >= bound) {
      throw new MeshError({ code: 'joint_out_of_range', expected: `a joint from 0 to ${bound - 1}`, found: String(given[i]), detail: `mesh ${path.slice(0, 200)}: expected a joint from 0 to ${bound - 1} in jointIndices, found ${given[i]} at place ${i}` });
    }
    highest = Math.max(highest, given[i]);
  }
  const names = joints.length > 0 ? shortNames(joints) : distinctNames(Array<string>(highest + 1).fill(''), 'joint');
  const skin: SkinWeights = {
    starts: rigid ? new Uint32Array(vertices + 1) : Uint32Array.from({ length: vertices + 1 }, (_, v) => v * width),
    joints: Uint32Array.from(given),
    weights: Float64Array.from(weights),
    names,
  };
  if (!rigid) return labelByJoint(cage.faceStarts, cage.faceVertices, skin);
  let best = 0;
  for (let k = 1; k < width; k++) if (weights[k] > weights[best]) best = k;
  return { names, labels: new Int32Array(cage.faceStarts.length - 1).fill(given[best]) };
}

/** Joint names that a prim brings: its own order, or that of the skeleton that it names. */
export function jointsOf(prim: UsdPrim, find: (path: string) => UsdPrim | null): string[] {
  const own = textsOf(prim, 'skel:joints');
  if (own.length > 0) return own;
  const skeleton = prim.relationships.get('skel:skeleton')?.[0];
  const found = skeleton === undefined ? null : find(skeleton);
  return found ? textsOf(found, 'joints') : [];
}
