import type { Cage } from '../engine/cage';
import { holeFlags } from '../engine/mesh/holes';
import { oneLabel } from './bare-cage';
import { checkCoordinates } from './check-coordinates';
import { shortNames } from './distinct-names';
import { IDENTITY, isIdentity, mirrors, multiply, reverseFaces, transformPoints, type Matrix } from './matrix';
import { CageTotals, mergeCages } from './merge-cages';
import { MeshError } from './mesh-error';
import { groupLabels, jointLabels, jointsOf, materialLabels, nameOfPath, readSubsets } from './usd-labels';
import { LOSSY_CODES } from './lossy-codes';
import { UsdNotes } from './usd-notes';
import { usdPolygons } from './usd-polygons';
import { MOST_USD_PRIMS, numbersOf, textOf, type UsdLayer, type UsdPrim } from './usd-prim';
import { primTransform } from './usd-transform';

/** What a prim hands down to those below it. */
interface Inherited {
  world: Matrix;
  path: string;
  material: string | null;
  joints: string[];
  purpose: string | null;
}

interface Found {
  path: string;
  mesh: UsdPrim;
  inherited: Inherited;
}

const NOT_POLYGONS = new Set(['Sphere', 'Cube', 'Cylinder', 'Cone', 'Capsule', 'Plane', 'NurbsPatch', 'NurbsCurves', 'BasisCurves', 'HermiteCurves', 'Points', 'TetMesh']);
const NOT_RENDERED = new Set(['proxy', 'guide']);
/** Share of the box's diagonal by which points may lie outside the authored extent before it is said. */
const EXTENT_SLACK = 0.01;

/** Arcs in the words of the text form. */
const ARC_WORDS: Record<string, string> = { payload: 'payload', inheritPaths: 'inherits' };

/** Walks a layer for its meshes, and notes what it passes over. */
class UsdScene {
  readonly found: Found[] = [];
  readonly notes = new UsdNotes();
  private visited = 0;
  private byPath: Map<string, UsdPrim> | null = null;

  constructor(private readonly layer: UsdLayer) {}

  walk(): void {
    const top: Inherited = { world: IDENTITY, path: '', material: null, joints: [], purpose: null };
    for (const layer of this.layer.subLayers) this.notes.add('layers_ignored', layer, (layers) => `Left out the layers that this one builds on, ${layers}: only what the file itself holds is read. Export it flattened.`);
    for (const prim of this.layer.root) this.visit(prim, top);
  }

  private visit(prim: UsdPrim, above: Inherited): void {
    if (++this.visited > MOST_USD_PRIMS) throw new MeshError({ code: 'too_large', expected: `at most ${MOST_USD_PRIMS} prims`, detail: `expected at most ${MOST_USD_PRIMS} prims in the scene, found more` });
    const path = `${above.path}/${prim.name}`;
    if (prim.specifier !== 'def' || !prim.active) return;
    for (const arc of prim.arcs) this.noteArc(arc, path);
    if (textOf(prim, 'visibility') === 'invisible') return this.notes.add('hidden', path, (paths) => `Left out what is invisible: ${paths}.`, 'invisible');
    const purpose = textOf(prim, 'purpose') ?? above.purpose;
    if (purpose !== null && NOT_RENDERED.has(purpose)) return this.notes.add('hidden', path, (paths) => `Left out what has the purpose ${purpose}: ${paths}.`, purpose);
    if (prim.typeName === 'PointInstancer') return this.notes.add('instances_ignored', path, (paths) => `Left out the instances of ${paths}: export them as meshes.`);
    if (NOT_POLYGONS.has(prim.typeName)) this.notes.add('not_polygons', path, (paths) => `Left out what is no mesh but a ${prim.typeName}: ${paths}.`, prim.typeName);
    const { local, resets, animated } = primTransform(prim, path);
    if (animated || prim.attributes.get('points')?.animated) this.notes.add('animated', path, (paths) => `Measured at its default, or else at the first time, since it moves over time: ${paths}.`);
    const joints = jointsOf(prim, (target) => this.find(target));
    const inherited: Inherited = {
      world: isIdentity(local) ? (resets ? IDENTITY : above.world) : resets ? local : multiply(local, above.world),
      path,
      material: prim.relationships.get('material:binding')?.[0] ?? above.material,
      joints: joints.length > 0 ? joints : above.joints,
      purpose,
    };
    if (prim.typeName === 'Mesh') this.found.push({ path, mesh: prim, inherited });
    for (const child of prim.children) this.visit(child, inherited);
  }

  /** Variants are a choice that the file leaves open; everything else is geometry that lies elsewhere. */
  private noteArc(arc: string, path: string): void {
    if (/^variant/.test(arc)) this.notes.add('variants_ignored', path, (paths) => `Left out the variants of ${paths}: export the one that is meant.`);
    else this.notes.add('not_composed', path, (paths) => `Left out what ${paths} bring${paths.includes(' and ') ? '' : 's'} in by ${ARC_WORDS[arc] ?? arc}: it is not in the file, nor beside it.`, arc);
  }

  private find(path: string): UsdPrim | null {
    this.byPath ??= indexPrims(this.layer.root);
    return this.byPath.get(path) ?? null;
  }
}

function indexPrims(root: UsdPrim[]): Map<string, UsdPrim> {
  const found = new Map<string, UsdPrim>();
  const add = (prims: UsdPrim[], above: string) => {
    for (const prim of prims) {
      // What is referred to a thousand times over is not indexed to the end; names beyond are simply not found.
      if (found.size > MOST_USD_PRIMS) return;
      found.set(`${above}/${prim.name}`, prim);
      add(prim.children, `${above}/${prim.name}`);
    }
  };
  add(root, '');
  return found;
}

/**
 * One cage of all the meshes that a USD layer defines and shows, at their places in the scene. Meshes name objects; face subsets name groups; bound materials and
 * skin joints their own labels. A left-handed mesh, or a mirrored one, is turned the right way out, which is no fault. Errors: MeshError with the prim's path.
 */
export function readUsdMeshes(layer: UsdLayer): Cage {
  const scene = new UsdScene(layer);
  scene.walk();
  const names = shortNames(scene.found.map((one) => one.path.slice(1)));
  const cages: Cage[] = [];
  const held = new CageTotals();
  for (const [i, one] of scene.found.entries()) {
    const cage = readMesh(scene, one, names[i]);
    if (!cage) continue;
    // References may place one mesh many thousand times, so the sum is held as it grows.
    held.add(cage);
    cages.push(cage);
  }
  const lost = cages.length === 0 ? scene.notes.find(LOSSY_CODES) : null;
  if (cages.length === 0) throw new MeshError({ code: 'no_faces', expected: 'a mesh', detail: `expected at least one mesh with faces in the layer, found none${lost ? `. ${lost.message.replace(/\.$/, '')}` : ''}` });
  if (new Set(cages.map((cage) => cage.scheme)).size > 1) scene.notes.add('schemes_differ', '', () => 'The meshes of the file ask for different subdivision schemes; one is used for all.');
  const merged = mergeCages(cages);
  if (holeFlags(merged)?.includes(0) === false) throw new MeshError({ code: 'no_faces', expected: 'a face that is no hole', detail: 'expected at least one face that is no hole in the layer, found none' });
  const metres = layer.metersPerUnit;
  if (metres !== null && !(metres > 0 && metres < Infinity)) throw new MeshError({ code: 'bad_unit', expected: 'a positive number for metersPerUnit', found: String(metres), detail: `expected a positive number for metersPerUnit, found ${metres}` });
  return { ...merged, metresPerUnit: metres, upAxis: layer.upAxis, warnings: [...scene.notes.list(), ...merged.warnings] };
}

function readMesh(scene: UsdScene, { path, mesh, inherited }: Found, name: string): Cage | null {
  if ((numbersOf(mesh, 'faceVertexCounts')?.length ?? 0) === 0) {
    scene.notes.add('empty_mesh', path, (paths) => `Left out what has no faces: ${paths}.`);
    return null;
  }
  const cage = usdPolygons(mesh, path);
  checkExtent(scene, mesh, cage.positions, path);
  transformPoints(cage.positions, inherited.world);
  checkCoordinates(cage.positions, `mesh ${path.slice(0, 200)}: `, null);
  if ((textOf(mesh, 'orientation') === 'leftHanded') !== mirrors(inherited.world)) reverseFaces(cage.faceStarts, cage.faceVertices);
  const faces = cage.faceStarts.length - 1;
  const subsets = readSubsets(mesh, faces, path);
  return {
    ...cage,
    objects: oneLabel(name, faces),
    groups: groupLabels(subsets, faces, name),
    materials: materialLabels(subsets, faces, inherited.material === null ? null : nameOfPath(inherited.material)),
    joints: jointLabels(mesh, cage, inherited.joints, path),
  };
}

/** Points far outside the box that the file itself states mean that one of the two was not read, or not written, right. */
function checkExtent(scene: UsdScene, mesh: UsdPrim, positions: Float64Array, path: string): void {
  const extent = numbersOf(mesh, 'extent');
  if (!extent || extent.length !== 6 || !Array.from(extent).every(Number.isFinite)) return;
  const diagonal = Math.hypot(extent[3] - extent[0], extent[4] - extent[1], extent[5] - extent[2]);
  let beyond = 0;
  for (let i = 0; i < positions.length; i++) beyond = Math.max(beyond, extent[i % 3] - positions[i], positions[i] - extent[3 + (i % 3)]);
  if (beyond > EXTENT_SLACK * diagonal) scene.notes.add('extent_disagrees', path, () => `Points of mesh ${path.slice(0, 200)} lie up to ${beyond.toPrecision(4)} outside the extent that the file states.`);
}
