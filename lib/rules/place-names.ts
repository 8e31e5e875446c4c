import type { KnownAsset } from './known-asset';
import { categoryOf, ELSEWHERE, fitKnown, LOOSE, SUFFIX, type Place } from './known-places';

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
    const deepest = folders.reduce((most, one) => Math.max(most, one.length), 1);
    for (let steps = 1; steps <= deepest; steps++) {
      const codes = folders.map((one) => [...one.slice(-steps), name].join('_').slice(-MAX_ASSET_CODE));
      if (new Set(codes).size === codes.length && !codes.some(isTaken)) return codes;
    }
  }
  const used = new Set<string>();
  const nextOf = new Map<string, number>();
  return places.map(({ folders }) => {
    const plain = [...folders, name].join('_').slice(-MAX_ASSET_CODE);
    let code = plain;
    let next = nextOf.get(plain) ?? 2;
    for (; used.has(code) || isTaken(code); next++) code = `${plain.slice(-(MAX_ASSET_CODE - 5))}_${next}`;
    nextOf.set(plain, next);
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

interface Fitting {
  place: Place;
  score: number;
}

/** Of the places that fit one known asset, those that are taken for it: all, unless they contest it; then the best one, if there is one best. */
function keepers(fitting: readonly Fitting[]): readonly Fitting[] {
  if (!isContested(fitting.map((one) => one.place))) return fitting;
  const best = fitting.reduce((most, one) => Math.max(most, one.score), 0);
  const first = fitting.filter((one) => one.score === best);
  return first.length === 1 ? first : [];
}

/** One name of a drop: each of its places to an asset that is there, or to a new one. */
function placeOneName(name: string, files: readonly NameToPlace[], known: readonly KnownAsset[], isTaken: (code: string) => boolean): Map<string, PlacedName> {
  const places = placesOf(files);
  const wishes = new Map<KnownAsset, Fitting[]>();
  const fit = fitKnown(known);
  for (const place of places) {
    const best = fit(place);
    if (!best) continue;
    const fitting = wishes.get(best.asset);
    if (fitting) fitting.push({ place, score: best.score });
    else wishes.set(best.asset, [{ place, score: best.score }]);
  }
  const placed = new Map<string, PlacedName>();
  for (const [asset, fitting] of wishes) {
    for (const { place, score } of keepers(fitting)) {
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
      const others = knownOf.get(name);
      if (others) others.push(entry);
      else knownOf.set(name, [entry]);
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
