import fc from 'fast-check';
import type { Cage } from '@/lib/engine/cage';
import { MeshError } from '@/lib/formats/mesh-error';
import { readMesh } from '@/lib/formats/read-mesh';

const NUMBERS = ['nan', '-inf', '1e308', '-1', '4294967296', '1e9', '""', '{', ')', '\n', '\0', 'x'.repeat(65_536), '=cmd|x', '\u0007', '../'];

/** A file with a few bytes changed, taken out, doubled or replaced by what hurts. */
export function mutations(bytes: Uint8Array): fc.Arbitrary<Uint8Array> {
  const place = fc.integer({ min: 0, max: Math.max(0, bytes.length - 1) });
  const edit = fc.oneof(
    fc.record({ kind: fc.constant('set' as const), at: place, value: fc.integer({ min: 0, max: 255 }) }),
    fc.record({ kind: fc.constant('flip' as const), at: place, value: fc.integer({ min: 0, max: 7 }) }),
    fc.record({ kind: fc.constant('cut' as const), at: place, value: fc.integer({ min: 1, max: 64 }) }),
    fc.record({ kind: fc.constant('double' as const), at: place, value: fc.integer({ min: 1, max: 64 }) }),
    fc.record({ kind: fc.constant('insert' as const), at: place, value: fc.integer({ min: 0, max: NUMBERS.length - 1 }) }),
  );
  return fc.array(edit, { minLength: 1, maxLength: 4 }).map((edits) => {
    let mutated = Uint8Array.from(bytes);
    for (const { kind, at, value } of edits) {
      if (kind === 'set') mutated[at % Math.max(1, mutated.length)] = value;
      else if (kind === 'flip') mutated[at % Math.max(1, mutated.length)] ^= 1 << value;
      else {
        const middle = kind === 'cut' ? new Uint8Array(0) : kind === 'double' ? join(mutated.slice(at, at + value), mutated.slice(at, at + value)) : new TextEncoder().encode(NUMBERS[value]);
        mutated = join(mutated.slice(0, at), middle, mutated.slice(kind === 'insert' ? at : at + value));
      }
    }
    return mutated;
  });
}

function join(...pieces: Uint8Array[]): Uint8Array<ArrayBuffer> {
  return Uint8Array.from(pieces.flatMap((piece) => Array.from(piece)));
}

/** The MeshError that reading a file ends with, or null where it gives a sound cage. Any other error, and a cage that is not sound, is thrown. */
export async function faultOfReading(name: string, bytes: Uint8Array): Promise<MeshError | null> {
  try {
    refuseUnsound(await readMesh(name, once(bytes)));
    return null;
  } catch (error) {
    if (error instanceof MeshError) return error;
    throw error;
  }
}

async function* once(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  yield bytes;
}

/** What the engine relies on: finite coordinates, rising rows of at least three corners, every index and label in range. */
function refuseUnsound(cage: Cage): void {
  const vertices = cage.positions.length / 3;
  const faces = cage.faceStarts.length - 1;
  const check = (holds: boolean, what: string) => {
    if (!holds) throw new Error(`unsound cage: ${what}`);
  };
  check(cage.positions.every((value) => Math.abs(value) <= 1e50), 'coordinates');
  check(faces > 0 && cage.faceStarts[0] === 0 && cage.faceStarts[faces] === cage.faceVertices.length, 'rows');
  for (let face = 0; face < faces; face++) check(cage.faceStarts[face + 1] - cage.faceStarts[face] >= 3, 'corners of a face');
  check([...cage.faceVertices, ...cage.creaseVertices, ...cage.cornerVertices].every((vertex) => vertex < vertices), 'vertices');
  check(cage.creaseVertices.length === 2 * cage.creaseSharpness.length && cage.cornerVertices.length === cage.cornerSharpness.length, 'tags');
  check([...cage.creaseSharpness, ...cage.cornerSharpness].every((value) => value >= 0 && value <= 3.5e38), 'sharpness');
  check(cage.metresPerUnit === null || (cage.metresPerUnit > 0 && cage.metresPerUnit < Infinity), 'unit');
  for (const labels of [cage.groups, cage.objects, cage.materials, cage.joints]) {
    if (labels) check(labels.labels.length === faces && labels.labels.every((label) => label >= -1 && label < labels.names.length), 'labels');
  }
}
