import type { Category } from './states';

/** The newest take of one number of an asset: with these bytes under these options nothing would change. */
export interface KnownContent {
  number: number;
  take: number;
  bytes: number;
  sha256: string;
  /** The measuring options as one word (see optionsWord). */
  options: string;
}

/** What a show has of an asset, as far as the names of a drop need it. */
export interface KnownAsset {
  asset: string;
  category: Category;
  /** Number of each version, one entry a take. */
  versions: number[];
  /** The name that its files are read to, where a folder joined the code; else the code itself. */
  name?: string;
  /** Folders that its files came from, each with slashes between. */
  places?: string[];
  /** The newest take of each number. */
  contents?: KnownContent[];
}

/** Options of a measurement that decide whether equal bytes are an equal version. */
export interface OptionsOfMeasure {
  scheme: string;
  boundary: string;
  triangles: string;
  creasing: string;
  partsBy: string;
  weld?: boolean;
  turnFaces?: boolean;
}

/** The options as one word, equal where a measurement would be the same. */
export function optionsWord(options: OptionsOfMeasure): string {
  const { scheme, boundary, triangles, creasing, partsBy, weld = false, turnFaces = false } = options;
  return [scheme, boundary, triangles, creasing, partsBy, weld, turnFaces].join(' ');
}
