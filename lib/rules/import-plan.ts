import type { KnownAsset } from './known-asset';
import { MAX_ASSET_CODE, placeNames } from './place-names';
import { readPath } from './read-path';
import { CATEGORIES, type Category } from './states';

/** What a file is called and what its sender says instead of the pattern. */
export interface NamedFile {
  name: string;
  asset?: string | null;
  version?: number | null;
  category?: string | null;
}

/** Where a file of a batch will go. `asset` is null where the name does not match and nothing was said. */
export interface PlannedFile {
  name: string;
  asset: string | null;
  category: Category;
  version: number | null;
  /** The folder stands before the name, since another asset has the same one. */
  qualified: boolean;
  /** Another file of the batch comes first under the same asset and number (or both have none). */
  duplicate: boolean;
  /** The name as it was read, before a folder joined it; null where the sender said the asset. */
  readName: string | null;
  /** Folders that tell the asset from another one of its name, with slashes between. */
  place: string;
  /** Folders that the asset came from until now, where this file is from others; `elsewhere` when they share nothing. */
  moved?: { from: string; elsewhere: boolean };
}

/** What of a plan is kept with an import's file, so that a later change of the pattern or of the show moves nothing. */
export type StoredPlan = Omit<PlannedFile, 'name'>;

export const MAX_VERSION = 999_999_999;

/** As shown: v012, v012-2. */
export function versionLabel(number: number, take: number): string {
  return `v${String(number).padStart(3, '0')}${take > 1 ? `-${take}` : ''}`;
}

/**
 * Reads all names of a batch together and against what the show has. The same name in folders that cannot be one asset is several
 * assets, told apart by their folders (see placeNames). The outcome does not depend on the order. Aligned with `files`.
 */
export function planImport(files: readonly NamedFile[], pattern: string | null, known: readonly KnownAsset[] = []): PlannedFile[] {
  const planned = files.map((file): PlannedFile => {
    const { read, place } = readPath(file.name, pattern);
    const category = CATEGORIES.find((one) => one === file.category) ?? read?.category ?? 'other';
    const asset = file.asset ?? read?.asset ?? null;
    const byName = !file.asset && read !== null;
    return {
      name: file.name,
      asset: asset === null ? null : asset.slice(0, MAX_ASSET_CODE),
      category,
      version: file.version ?? read?.version ?? null,
      qualified: false,
      duplicate: false,
      readName: byName ? read.asset : null,
      place: byName ? place : '',
    };
  });
  const free = planned.filter((file) => file.readName !== null);
  const said = new Set(planned.filter((file) => file.readName === null && file.asset !== null).map((file) => file.asset!));
  const names = free.map((file) => ({ name: file.readName!, place: file.place === '' ? [] : file.place.split('/'), version: file.version }));
  placeNames(names, known, said).forEach((placed, index) => {
    Object.assign(free[index], { asset: placed.asset, qualified: placed.qualified });
    if (placed.movedFrom !== null) free[index].moved = { from: placed.movedFrom, elsewhere: placed.elsewhere };
  });
  markDuplicates(planned);
  return planned;
}

function markDuplicates(planned: readonly PlannedFile[]): void {
  const first = new Map<string, PlannedFile>();
  for (const file of planned) {
    if (file.asset === null) continue;
    const key = `${file.asset}\n${file.version}`;
    const other = first.get(key);
    if (!other || file.name < other.name) first.set(key, file);
    if (other) (file.name < other.name ? other : file).duplicate = true;
  }
}

/** The order in which files of one import are taken up: by asset, numbered ones first and ascending, then by name. */
export function compareInProcessingOrder(a: Pick<PlannedFile, 'asset' | 'version' | 'name'>, b: Pick<PlannedFile, 'asset' | 'version' | 'name'>): number {
  const [first, second] = [a.asset ?? '', b.asset ?? ''];
  if (first !== second) return first < second ? -1 : 1;
  const [one, two] = [a.version ?? Infinity, b.version ?? Infinity];
  if (one !== two) return one < two ? -1 : 1;
  return a.name < b.name ? -1 : a.name > b.name ? 1 : 0;
}
