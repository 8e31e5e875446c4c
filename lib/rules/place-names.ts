import type { KnownAsset } from './known-asset';
import { categoryOfFolder } from './name-pattern';
import type { Category } from './states';

export const MAX_ASSET_CODE = 128;

/** A file whose name was read, with the folders that may tell its asset from another one of the same name. */
export interface NameToPlace {
  name: string;
  place: readonly string[];
  version: number | null;
}

/** Where such a name goes. */
export interface PlacedName {
  asset: string;
  /** A folder was put before the name, since another asset has it. */
  qualified: boolean;
  /** The asset is known from these folders, and this file is from others. */
  movedFrom: string | null;
  /** Those others have nothing in common with the known ones. */
  elsewhere: boolean;
}

interface Place {
  folders: readonly string[];
  /** The folders as one text. */
  key: string;
  category: Category | null;
  versions: ReadonlySet<number | null>;
}

/** How well a file's folders fit those of a known asset; whatever is above NONE is taken for it. */
const NONE = 0;
const ELSEWHERE = 1;
const LOOSE = 2;
const NEAR = 10;
const SUFFIX = 1_000;
const EXACT = 100_000;

const categoryOf = (folders: readonly string[]): Category | null => folders.map(categoryOfFolder).findLast((found) => found !== null) ?? null;

function sharedTail(a: readonly string[], b: readonly string[]): number {
  let shared = 0;
  while (shared < a.length && shared < b.length && a[a.length - 1 - shared] === b[b.length - 1 - shared]) shared++;
  return shared;
}

function fit(place: Place, known: KnownAsset, isOnly: boolean): number {
  const places = known.places?.filter((one) => one !== '') ?? [];
  if (place.folders.length === 0) return known.asset === known.name || isOnly ? LOOSE : NONE;
  if (places.length === 0) return LOOSE;
  const fits = places.map((text) => {
    const folders = text.split('/');
    const category = categoryOf(folders);
    if (place.category !== null && category !== null && place.category !== category) return NONE;
    const shared = sharedTail(place.folders, folders);
    if (text === place.key) return EXACT;
    if (shared === Math.min(folders.length, place.folders.length)) return SUFFIX + shared;
    if (shared > 0) return NEAR + shared;
    const isNewNumber = [...place.versions].every((version) => version !== null && !known.versions.includes(version));
    return isNewNumber && isOnly ? ELSEWHERE : NONE;
  });
  return Math.max(...fits);
}

/** Whether files of these places cannot be versions of one asset: two have one number (or none), or the folders name two categories. */
function isContested(places: readonly Place[]): boolean {
  const versions = places.flatMap((place) => [...place.versions]);
  const categories = new Set(places.map((place) => place.category).filter((category) => category !== null));
  return new Set(versions).size < versions.length || categories.size > 1;
}

/** A code for each place, with as many folders before the name as make all of them new; none for a place without folders where the name is free. */
function qualify(name: string, places: readonly Place[], isTaken: (code: string) => boolean): string[] {
  const withoutName = places.map((place) => place.folders.filter((folder) => folder.toLowerCase() !== name.toLowerCase()));
  for (const folders of [withoutName, places.map((place) => place.folders)]) {
    const deepest = Math.max(1, ...folders.map((one) => one.length));
    for (let steps = 1; steps <= deepest; steps++) {
      const codes = folders.map((one) => [...one.slice(-steps), name].join('_').slice(-MAX_ASSET_CODE));
      if (new Set(codes).size === codes.length && !codes.some(isTaken)) return codes;
    }
  }
  const used = new Set<string>();
  return places.map(({ folders }) => {
    const plain = [...folders, name].join('_').slice(-MAX_ASSET_CODE);
    let code = plain;
    for (let next = 2; used.has(code) || isTaken(code); next++) code = `${plain.slice(-(MAX_ASSET_CODE - 5))}_${next}`;
    used.add(code);
    return code;
  });
}

function placesOf(files: readonly NameToPlace[]): Place[] {
  const versions = new Map<string, Set<number | null>>();
  for (const { place, version } of files) {
    const key = place.join('/');
    const known = versions.get(key);
    if (known) known.add(version);
    else versions.set(key, new Set([version]));
  }
  return [...versions].map(([key, of]) => ({ key, folders: key === '' ? [] : key.split('/'), category: categoryOf(key.split('/')), versions: of })).sort((a, b) => (a.key < b.key ? -1 : 1));
}

/** Of the places that fit one known asset, those that are taken for it: all, unless they contest it; then the best one, if there is one best. */
function keepers(fitting: readonly { place: Place; score: number }[]): Place[] {
  if (!isContested(fitting.map((one) => one.place))) return fitting.map((one) => one.place);
  const best = Math.max(...fitting.map((one) => one.score));
  const first = fitting.filter((one) => one.score === best);
  return first.length === 1 ? [first[0].place] : [];
}

/** One name of a drop: each of its places to an asset that is there, or to a new one. */
function placeOneName(name: string, files: readonly NameToPlace[], known: readonly KnownAsset[], isTaken: (code: string) => boolean): Map<string, PlacedName> {
  const places = placesOf(files);
  const wishes = new Map<KnownAsset, { place: Place; score: number }[]>();
  for (const place of places) {
    const scored = known.map((asset) => ({ asset, score: fit(place, asset, known.length === 1) })).sort((a, b) => b.score - a.score);
    const [first, second] = scored;
    if (!first || first.score === NONE || first.score === second?.score) continue;
    wishes.set(first.asset, [...(wishes.get(first.asset) ?? []), { place, score: first.score }]);
  }
  const placed = new Map<string, PlacedName>();
  for (const [asset, fitting] of wishes) {
    for (const place of keepers(fitting)) {
      const score = fitting.find((one) => one.place === place)!.score;
      placed.set(place.key, { asset: asset.asset, qualified: asset.asset !== name, movedFrom: score < SUFFIX && score !== LOOSE ? (asset.places?.at(-1) ?? null) : null, elsewhere: score === ELSEWHERE });
    }
  }
  const free = places.filter((place) => !placed.has(place.key));
  const isOneNew = known.length === 0 && !isContested(free);
  const codes = isOneNew ? free.map(() => name) : qualify(name, free, isTaken);
  free.forEach((place, index) => placed.set(place.key, { asset: codes[index], qualified: codes[index] !== name, movedFrom: null, elsewhere: false }));
  return placed;
}

/**
 * Decides which asset each name of a drop means. The same name in folders that cannot belong to one asset is several assets, and the
 * folder joins the code of the newer ones; an asset keeps its code in later drops from the same folders. The outcome does not depend
 * on the order of the files. Aligned with `files`.
 * @param said assets that senders named themselves: their codes are not given to others
 */
export function placeNames(files: readonly NameToPlace[], known: readonly KnownAsset[], said: ReadonlySet<string>): PlacedName[] {
  const knownOf = new Map<string, KnownAsset[]>();
  for (const asset of known) {
    const names = new Set([asset.name ?? asset.asset, asset.asset]);
    for (const name of names) {
      const entry = name === (asset.name ?? asset.asset) ? { ...asset, name } : { ...asset, name, places: [] };
      knownOf.set(name, [...(knownOf.get(name) ?? []), entry]);
    }
  }
  const byName = new Map<string, NameToPlace[]>();
  for (const file of files) {
    const group = byName.get(file.name);
    if (group) group.push(file);
    else byName.set(file.name, [file]);
  }
  const taken = new Set([...known.map((asset) => asset.asset), ...said, ...byName.keys()]);
  const places = new Map<string, Map<string, PlacedName>>();
  for (const name of [...byName.keys()].sort()) {
    const candidates = knownOf.get(name) ?? [];
    const isNameFree = candidates.every((asset) => asset.asset !== name);
    const placed = placeOneName(name, byName.get(name)!, candidates, (code) => (code !== name || !isNameFree) && taken.has(code));
    for (const { asset } of placed.values()) taken.add(asset);
    places.set(name, placed);
  }
  return files.map((file) => places.get(file.name)!.get(file.place.join('/'))!);
}
