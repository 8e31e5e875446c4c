import { readName, splitPath, takeVersion } from './name-pattern';
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
  /** The folder was put before the name, since two files of the batch would have been one asset. */
  qualified: boolean;
  /** Another file of the batch comes first under the same asset and number. */
  duplicate: boolean;
}

/** What of a plan is kept with an import's file, so that a later change of the pattern or of the show moves nothing. */
export type StoredPlan = Omit<PlannedFile, 'name'>;

/** Versions of an asset that the show has: `highest` null for an asset without one. */
export interface KnownAsset {
  asset: string;
  category: Category;
  versions: number[];
}

export const MAX_ASSET_CODE = 128;
export const MAX_VERSION = 999_999_999;

/** As shown: v012, v012-2. */
export function versionLabel(number: number, take: number): string {
  return `v${String(number).padStart(3, '0')}${take > 1 ? `-${take}` : ''}`;
}

/**
 * Reads all names of a batch together. The same file name in two folders with nothing else to tell them apart is two assets:
 * such assets get as many of their folders before the name as keep them apart. The outcome does not depend on the order.
 */
export function planImport(files: readonly NamedFile[], pattern: string | null): PlannedFile[] {
  const planned = files.map((file): PlannedFile => {
    const read = readName(file.name, pattern);
    const category = CATEGORIES.find((one) => one === file.category) ?? read?.category ?? 'other';
    const asset = file.asset ?? read?.asset ?? null;
    return { name: file.name, asset: asset === null ? null : asset.slice(0, MAX_ASSET_CODE), category, version: file.version ?? read?.version ?? null, qualified: false, duplicate: false };
  });
  if (pattern === null) qualifyByFolder(planned, files);
  markDuplicates(planned);
  return planned;
}

const groupBy = <T>(items: readonly T[], key: (item: T) => string): T[][] => {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const group = groups.get(key(item));
    if (group) group.push(item);
    else groups.set(key(item), [item]);
  }
  return [...groups.values()];
};

/** Folders that tell assets apart: those that only name a version do not. */
function tellingFolders(name: string): string[] {
  return splitPath(name).folders.map((folder) => takeVersion(folder).rest).filter((folder) => folder !== '');
}

function qualifyByFolder(planned: PlannedFile[], files: readonly NamedFile[]): void {
  const free = planned.filter((file, index) => file.asset !== null && !files[index].asset);
  for (const group of groupBy(free, (file) => file.asset ?? '')) {
    const folderOf = new Map(group.map((file) => [file, tellingFolders(file.name)]));
    const contested = groupBy(group, (file) => String(file.version)).some((same) => new Set(same.map((file) => folderOf.get(file)!.join('/'))).size > 1);
    if (!contested) continue;
    const folders = [...new Set(group.map((file) => folderOf.get(file)!.join('/')))].map((folder) => folder.split('/'));
    const deepest = Math.max(...folders.map((folder) => folder.length));
    let steps = 1;
    while (steps < deepest && new Set(folders.map((folder) => folder.slice(-steps).join('_'))).size < folders.length) steps++;
    for (const file of group) {
      const before = folderOf.get(file)!.slice(-steps);
      if (before.length === 0) continue;
      file.asset = [...before, file.asset].join('_').slice(-MAX_ASSET_CODE);
      file.qualified = true;
    }
  }
}

function markDuplicates(planned: PlannedFile[]): void {
  const numbered = planned.filter((file) => file.asset !== null && file.version !== null);
  for (const group of groupBy(numbered, (file) => `${file.asset}\n${file.version}`)) {
    const ordered = group.toSorted((a, b) => (a.name < b.name ? -1 : 1));
    for (const file of ordered.slice(1)) file.duplicate = true;
  }
}

export const OUTCOMES = ['new_asset', 'new_version', 'next_take', 'unmatched'] as const;
export type Outcome = (typeof OUTCOMES)[number];

export interface PreviewRow extends PlannedFile {
  outcome: Outcome;
  /** Label that the version will get, as far as it can be told before the bytes are known. */
  label: string | null;
  /** Sentences that deserve a look before anything goes up. */
  warnings: string[];
}

/** What will happen to each file, given what the show has. Bytes equal to an asset's current version will change nothing in the end. */
export function previewImport(files: readonly NamedFile[], pattern: string | null, known: readonly KnownAsset[]): PreviewRow[] {
  const versionsOf = new Map(known.map((asset) => [asset.asset, [...asset.versions]]));
  const planned = planImport(files, pattern);
  const rows = new Map<PlannedFile, PreviewRow>();
  for (const file of planned.toSorted(compareInProcessingOrder)) rows.set(file, previewRow(file, versionsOf, known));
  return planned.map((file) => rows.get(file)!);
}

/** The order in which files of one import are taken up: by asset, numbered ones first and ascending, then by name. */
export function compareInProcessingOrder(a: Pick<PlannedFile, 'asset' | 'version' | 'name'>, b: Pick<PlannedFile, 'asset' | 'version' | 'name'>): number {
  const [first, second] = [a.asset ?? '', b.asset ?? ''];
  if (first !== second) return first < second ? -1 : 1;
  const [one, two] = [a.version ?? Infinity, b.version ?? Infinity];
  if (one !== two) return one < two ? -1 : 1;
  return a.name < b.name ? -1 : a.name > b.name ? 1 : 0;
}

function previewRow(file: PlannedFile, versionsOf: Map<string, number[]>, known: readonly KnownAsset[]): PreviewRow {
  if (file.asset === null) return { ...file, outcome: 'unmatched', label: null, warnings: ['The name does not match the show’s pattern. Give an asset.'] };
  const warnings: string[] = [];
  if (file.qualified) warnings.push('The same name is in another folder too: the folder joins the code.');
  const otherCase = known.find((asset) => asset.asset !== file.asset && asset.asset.toLowerCase() === file.asset!.toLowerCase());
  if (otherCase) warnings.push(`The show has ${otherCase.asset}; this one differs in upper and lower case only.`);
  const versions = versionsOf.get(file.asset);
  const highest = versions ? Math.max(...versions, -Infinity) : -Infinity;
  const number = file.version ?? (highest === -Infinity ? 1 : highest + 1);
  if (file.version === null && versions) warnings.push(`The name has no version, so it becomes ${versionLabel(number, 1)}.`);
  const takes = versions?.filter((version) => version === number).length ?? 0;
  if (file.duplicate) warnings.push('Two files of this batch have this asset and version; the later one becomes the next take.');
  else if (takes > 0) warnings.push(`${versionLabel(number, 1)} exists; other bytes become ${versionLabel(number, takes + 1)}.`);
  else if (highest !== -Infinity && number > highest + 1) warnings.push(`Nothing between ${versionLabel(highest, 1)} and ${versionLabel(number, 1)} is here.`);
  else if (number < highest) warnings.push(`${versionLabel(highest, 1)} stays the current version.`);
  versionsOf.set(file.asset, [...(versions ?? []), number]);
  const outcome: Outcome = takes > 0 ? 'next_take' : versions ? 'new_version' : 'new_asset';
  return { ...file, outcome, label: versionLabel(number, takes + 1), warnings };
}
