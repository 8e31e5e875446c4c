import type { Cage, FaceLabels } from '../engine/cage';
import { archiveContent, isFileOfArchive } from './archive-assets';
import { oneLabel } from './bare-cage';
import type { Beside } from './beside';
import { distinctNames } from './distinct-names';
import { extensionOf } from './mesh-extensions';
import { mergeCages } from './merge-cages';
import { MeshError } from './mesh-error';
import { pathFrom } from './names-beside';
import { openArchive, type Archive } from './open-archive';
import { readMeshBytes } from './read-mesh-bytes';

const ARCHIVES = new Set(['zip', 'usdz']);
const USD = new Set(['usd', 'usda', 'usdc']);
const MOST_MESHES = 1_000;

/**
 * Reads the meshes of a ZIP as one cage: each file is an object, or keeps its objects under its own name where there are several files. Files beside a mesh are found
 * by it, and are no meshes of their own then: a glTF's buffers, an OBJ's weights, a layer's layers. Of a `.usdz` the first layer is read, which is the one that counts by its standard. Archives in archives are refused.
 * Errors: MeshError that begins with the entry's name.
 */
export async function readMeshArchive(bytes: Uint8Array, name: string): Promise<Cage> {
  const archive = await openArchive(bytes);
  const files = archive.names.filter(isFileOfArchive);
  const nested = files.find((entry) => ARCHIVES.has(extensionOf(entry)));
  if (nested !== undefined) throw new MeshError({ code: 'nested_archive', found: nested, detail: `${nested.slice(0, 200)}: expected a mesh file, found an archive in the archive` });
  const meshes = extensionOf(name) === 'usdz' ? files.filter((entry) => USD.has(extensionOf(entry))).slice(0, 1) : (await archiveContent(archive)).meshes;
  if (meshes.length === 0) throw new MeshError({ code: 'no_meshes', expected: 'a mesh file', detail: `expected at least one mesh file in the archive, found none among ${files.length} files` });
  if (meshes.length > MOST_MESHES) throw new MeshError({ code: 'too_many_entries', expected: `at most ${MOST_MESHES} mesh files`, found: String(meshes.length), detail: `expected at most ${MOST_MESHES} mesh files in the archive, found ${meshes.length}` });
  const cages: Cage[] = [];
  for (const mesh of meshes) cages.push(await readEntry(archive, mesh));
  if (cages.length === 1) return cages[0];
  refuseMixedUnits(cages, meshes);
  const names = distinctNames(meshes.map((mesh) => mesh.replace(/^.*\//, '').replace(/\.[^.]*$/, '')), 'file');
  return mergeCages(cages.map((cage, i) => ({ ...cage, objects: under(names[i], cage, cage.objects), groups: under(names[i], cage, cage.groups) })));
}

async function readEntry(archive: Archive, mesh: string): Promise<Cage> {
  const held = new Map<string, Promise<Uint8Array>>();
  const beside: Beside = async (path) => {
    const entry = pathFrom(mesh, path);
    if (entry === null || !archive.names.includes(entry)) return null;
    if (!held.has(entry)) held.set(entry, archive.read(entry));
    return held.get(entry)!;
  };
  try {
    return await readMeshBytes(mesh, await archive.read(mesh), beside);
  } catch (error) {
    throw error instanceof MeshError && !error.detail.startsWith('archive entry') ? error.within(mesh.slice(0, 200)) : error;
  }
}

/** Labels that tell the same name in two files apart; a file without labels is one by its own name. */
function under(file: string, cage: Cage, labels: FaceLabels | null): FaceLabels {
  const faces = cage.faceStarts.length - 1;
  if (!labels) return oneLabel(file, faces);
  const names = [...labels.names.map((name) => `${file}/${name}`), file];
  return { names, labels: labels.labels.map((label) => (label < 0 ? names.length - 1 : label)) };
}

function refuseMixedUnits(cages: Cage[], meshes: string[]): void {
  const [first] = cages;
  const odd = cages.findIndex((cage) => cage.metresPerUnit !== first.metresPerUnit || cage.upAxis !== first.upAxis);
  if (odd < 0) return;
  const say = (cage: Cage) => `${cage.metresPerUnit ?? 'no'} metres per unit, ${cage.upAxis?.toUpperCase() ?? 'no axis'} up`;
  throw new MeshError({ code: 'units_differ', detail: `${meshes[odd].slice(0, 200)}: expected ${say(first)}, as in ${meshes[0].slice(0, 200)}, found ${say(cages[odd])}` });
}
