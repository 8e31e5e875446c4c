import type { KnownAsset } from './known-asset';
import { categoryOfFolder } from './name-pattern';
import type { Category } from './states';

/** Folders that files of one name lie in, with the versions that they have there. */
export interface Place {
  folders: readonly string[];
  /** The folders as one text. */
  key: string;
  category: Category | null;
  versions: ReadonlySet<number | null>;
}

/** How well a file's folders fit those of a known asset; whatever is above NONE is taken for it. */
const NONE = 0;
export const ELSEWHERE = 1;
export const LOOSE = 2;
const NEAR = 10;
export const SUFFIX = 1_000;
const EXACT = 100_000;

export const categoryOf = (folders: readonly string[]): Category | null => folders.map(categoryOfFolder).findLast((found) => found !== null) ?? null;

/** One place of a known asset, its folders apart. */
interface KnownPlace {
  asset: KnownAsset;
  text: string;
  folders: readonly string[];
  category: Category | null;
}

/** Folders read from the last one up: what lies under this end, and what is no deeper. Two assets a category are kept, since a tie of two is a tie. */
interface Step {
  next: Map<string, Step>;
  under: KnownPlace[];
  here: KnownPlace[];
}

/** So few assets of one name are all looked at. */
const FEW = 4;

const newStep = (): Step => ({ next: new Map(), under: [], here: [] });

function keepTwo(places: KnownPlace[], place: KnownPlace): void {
  let others = 0;
  for (const one of places) {
    if (one.category !== place.category) continue;
    if (one.asset === place.asset) return;
    if (++others === 2) return;
  }
  places.push(place);
}

function sharedTail(a: readonly string[], b: readonly string[]): number {
  let shared = 0;
  while (shared < a.length && shared < b.length && a[a.length - 1 - shared] === b[b.length - 1 - shared]) shared++;
  return shared;
}

/** The known asset that each place of a name is taken for, if one fits better than all others, and how well. */
export function fitKnown(known: readonly KnownAsset[]): (place: Place) => { asset: KnownAsset; score: number } | null {
  const only = known.length === 1 ? known[0] : null;
  const numbers = new Set(only?.versions);
  const placesOf = new Map<KnownAsset, KnownPlace[]>();
  const isMany = known.length > FEW;
  const root = newStep();
  for (const asset of known) {
    const texts = (asset.places ?? []).filter((text) => text !== '');
    const places = texts.map((text): KnownPlace => ({ asset, text, folders: text.split('/'), category: categoryOf(text.split('/')) }));
    placesOf.set(asset, places);
    if (isMany) for (const place of places) enter(root, place);
  }
  const loose = known.filter((asset) => placesOf.get(asset)!.length === 0);

  const fit = (place: Place, asset: KnownAsset): number => {
    if (place.folders.length === 0) return asset.asset === asset.name || asset === only ? LOOSE : NONE;
    const places = placesOf.get(asset)!;
    if (places.length === 0) return LOOSE;
    return Math.max(...places.map((one) => fitPlace(place, one)));
  };
  const fitPlace = (place: Place, { asset, text, folders, category }: KnownPlace): number => {
    if (place.category !== null && category !== null && place.category !== category) return NONE;
    if (text === place.key) return EXACT;
    const shared = sharedTail(place.folders, folders);
    if (shared === Math.min(folders.length, place.folders.length)) return SUFFIX + shared;
    if (shared > 0) return NEAR + shared;
    return asset === only && [...place.versions].every((version) => version !== null && !numbers.has(version)) ? ELSEWHERE : NONE;
  };

  return (place) => {
    const candidates = !isMany || place.folders.length === 0 ? known : new Set([...alike(root, place), ...loose.slice(0, 2)]);
    let best: { asset: KnownAsset; score: number } | null = null;
    let isTie = false;
    for (const asset of candidates) {
      const score = fit(place, asset);
      if (score === NONE || score < (best?.score ?? NONE)) continue;
      isTie = score === best?.score;
      best = { asset, score };
    }
    return isTie ? null : best;
  };
}

function enter(root: Step, place: KnownPlace): void {
  let step = root;
  for (const folder of place.folders.toReversed()) {
    let next = step.next.get(folder);
    if (!next) step.next.set(folder, (next = newStep()));
    step = next;
    keepTwo(step.under, place);
  }
  keepTwo(step.here, place);
}

/** Assets that share the place's last folders: of each number of folders at least two, where there are so many, so that neither the best nor a tie is missed. */
function alike(root: Step, { folders }: Place): KnownAsset[] {
  const found: KnownAsset[] = [];
  let step: Step | undefined = root;
  for (let up = folders.length - 1; up >= 0; up--) {
    step = step.next.get(folders[up]);
    if (!step) break;
    for (const { asset } of step.under) found.push(asset);
    for (const { asset } of step.here) found.push(asset);
  }
  return found;
}
