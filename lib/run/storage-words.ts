import { byteWords } from '@/lib/rules/byte-words';
import type { Concern, StorageCheck, StorageFault } from '@/lib/storage/check-storage';

const MOST_SHOWN = 200;

const sizeOf = (bytes: number | null): string => (bytes === null ? 'no' : `${bytes}`);

function sentenceOf({ kind, key, byteSize, storedBytes }: StorageFault): string {
  switch (kind) {
    case 'missing':
      return `Missing: ${key} (${byteWords(byteSize ?? 0)}) is not in the storage.`;
    case 'wrong_size':
      return `Wrong size: ${key} has ${sizeOf(storedBytes)} bytes in the storage and ${sizeOf(byteSize)} in the database.`;
    case 'wrong_hash':
      return `Damaged: the bytes of ${key} are not those that were stored.`;
    case 'orphan':
      return `Orphan: nothing refers to ${key} (${byteWords(byteSize ?? 0)}).`;
    case 'unknown':
      return `Unknown: the database knows nothing of ${key} (${byteWords(storedBytes ?? 0)}).`;
    case 'strange':
      return `Strange: ${key} is no name that this program gives. Look at it yourself.`;
    case 'part':
      return `Part: ${key} of an upload that goes on has ${sizeOf(storedBytes)} bytes in the storage and should have ${sizeOf(byteSize)}.`;
  }
}

const MENDED = { removed: '  Removed.', asked_again: '  Its sender is asked for it again.' } as const;
const NEEDED = '  The same file, sent again in any import of the show, brings it back.';

const concernWords = ({ show, file, asset, version }: Concern): string => `  ${show}: ${file}${asset === null ? '' : `, asset ${asset}`}${version === null ? '' : ` ${version}`}`;

/** Whether something is still wrong: what was removed although it is needed is, until it has been sent again. */
export const isStillWrong = (fault: StorageFault): boolean => fault.mended === null || fault.concerns.length > 0;

/** What a check found, in plain words, the files, assets and versions concerned under each fault. */
export function storageWords({ blobs, bytes, faults }: StorageCheck, deep: boolean): string {
  const lines = faults.slice(0, MOST_SHOWN).flatMap((fault) => [
    sentenceOf(fault),
    ...fault.concerns.map(concernWords),
    ...(fault.mended ? [MENDED[fault.mended]] : []),
    ...(fault.concerns.length > 0 ? [NEEDED] : []),
  ]);
  const more = faults.length - MOST_SHOWN;
  const end = `${blobs} stored files, ${byteWords(bytes)}, ${deep ? 'read whole' : 'by name and size'}: ${faults.length === 0 ? 'all is well.' : `${faults.length} ${faults.length === 1 ? 'fault' : 'faults'}.`}`;
  return [...lines, ...(more > 0 ? [`${more} more.`] : []), end].join('\n');
}
