import { byteWords } from '@/lib/rules/byte-words';
import { extensionOf } from '@/lib/rules/file-extension';
import type { ImportPreparation } from '@/lib/rules/import-answer';
import { isSideFile, meshOfSideFile } from '@/lib/rules/side-files';
import type { Category } from '@/lib/rules/states';

/** A file as it was dropped, under its path inside what was dropped. */
export interface DroppedFile {
  path: string;
  file: File;
}

/** What the person said in place of the name; null leaves it to the name. */
export interface Said {
  asset: string | null;
  version: number | null;
  category: Category | null;
}

export const NOTHING_SAID: Said = { asset: null, version: null, category: null };

export type DeskLimits = Pick<ImportPreparation, 'extensions' | 'max_file_bytes' | 'max_files' | 'max_import_bytes' | 'left_bytes'>;

/** The path of a dropped file inside what was dropped. */
function pathOf(file: File): string {
  const given = 'path' in file && typeof file.path === 'string' ? file.path : '';
  return (given || file.webkitRelativePath || file.name).replace(/^(\.?\/)+/, '').normalize('NFC');
}

/** What was dropped now beside what was there, by path; the same path again replaces its file. */
export function joinDropped(files: readonly DroppedFile[], dropped: readonly File[]): DroppedFile[] {
  const kept = new Map(files.map((file) => [file.path, file]));
  for (const file of dropped) kept.set(pathOf(file), { path: pathOf(file), file });
  return [...kept.values()].sort((a, b) => (a.path < b.path ? -1 : 1));
}

/** Why each file stays here, as a sentence; null where it may go up. What is over a limit of the whole import stays in the order of the paths. */
export function whyStaying(files: readonly DroppedFile[], limits: DeskLimits): (string | null)[] {
  let count = 0;
  let bytes = 0;
  return files.map(({ path, file }) => {
    const kind = extensionOf(path);
    if (!limits.extensions.includes(kind) && !isSideFile(path)) return kind === '' ? 'No extension: it holds no cage that can be read here.' : `.${kind} holds no cage that can be read here.`;
    if (file.size > limits.max_file_bytes) return `Larger than ${byteWords(limits.max_file_bytes)}, the most that a file may have.`;
    if (count >= limits.max_files) return `More than the ${limits.max_files.toLocaleString('en')} files that one import takes. Bring it in another one.`;
    if (bytes + file.size > limits.max_import_bytes) return `Over the ${byteWords(limits.max_import_bytes)} that one import takes. Bring it in another one.`;
    if (bytes + file.size > limits.left_bytes) return 'The show has no room left for it.';
    count++;
    bytes += file.size;
    return null;
  });
}

/** Which mesh reads a file that is no asset of its own; null for a mesh. */
export function readBeside(path: string): string | null {
  return isSideFile(path) ? meshOfSideFile(path).inWords : null;
}
