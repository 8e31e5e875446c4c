import { namesCategory, placeOf, readName, type ReadName } from './name-pattern';
import { MAX_ASSET_CODE } from './place-names';

/** Everything that a path says by a pattern. */
export interface ReadPath {
  /** Null where the path does not match; the asset cut to the length of a code. */
  read: ReadName | null;
  /** Folders that tell the asset from another one of its name, with slashes between. */
  place: string;
  /** A folder, or the pattern, names the category. */
  saysCategory: boolean;
}

/** A page reads the same names again with every change of the drop. */
const MOST_KEPT = 20_000;
const kept = new Map<string, ReadPath>();
let keptPattern: string | null = null;

/** Reads a path by a pattern, or by the built-in rule where that is null. What was read last by the same pattern is kept. */
export function readPath(path: string, pattern: string | null): ReadPath {
  if (pattern !== keptPattern || kept.size >= MOST_KEPT) kept.clear();
  keptPattern = pattern;
  let known = kept.get(path);
  if (!known) {
    const read = readName(path, pattern);
    known = { read: read && { ...read, asset: read.asset.slice(0, MAX_ASSET_CODE) }, place: read ? placeOf(path, pattern).join('/') : '', saysCategory: namesCategory(path, pattern) };
    kept.set(path, known);
  }
  return known;
}
