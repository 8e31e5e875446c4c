import type { Cage, Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import { MeshError } from '@/lib/formats/mesh-error';

export function facesOf(cage: Cage): number[][] {
  return Array.from({ length: cage.faceStarts.length - 1 }, (_, f) => Array.from(cage.faceVertices.subarray(cage.faceStarts[f], cage.faceStarts[f + 1])));
}

/** Names of the faces in order; null for those without. */
export function namesOf(labels: Cage['groups']): (string | null)[] {
  return Array.from(labels?.labels ?? [], (label) => (label < 0 ? null : labels!.names[label]));
}

/** Volume of a cage measured whole, and the parts' names when it is cut up by `partsBy`. `weld` joins borders first. */
export function measureAs(cage: Cage, scheme: Scheme, { weld = false } = {}) {
  const measured = measureCage(cage, { scheme, boundary: cage.boundary ?? 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'whole', weld });
  const [part] = measured.parts;
  return { volume: part.components.reduce((sum, one) => sum + one.solid.volume, 0), findings: measured.findings, components: part.components.length };
}

/** The same without subdivision. */
export function measureAsIs(cage: Cage, weld = false) {
  return measureAs(cage, 'polyhedral', { weld });
}

/** The error that reading ends with. Another error than a MeshError, or none, fails the test. */
export function failureOf(read: () => unknown): MeshError {
  try {
    read();
  } catch (error) {
    if (error instanceof MeshError) return error;
    throw error;
  }
  throw new Error('read without an error');
}

/** The same for readers that answer later. */
export async function laterFailureOf(read: () => Promise<unknown>): Promise<MeshError> {
  try {
    await read();
  } catch (error) {
    if (error instanceof MeshError) return error;
    throw error;
  }
  throw new Error('read without an error');
}
