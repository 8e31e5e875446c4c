import { compareInProcessingOrder, planImport, versionLabel, type NamedFile, type PlannedFile } from './import-plan';
import { optionsWord, type KnownAsset, type OptionsOfMeasure } from './known-asset';
import { readPath } from './read-path';

export const OUTCOMES = ['new_asset', 'new_version', 'next_take', 'unchanged', 'unmatched'] as const;
export type Outcome = (typeof OUTCOMES)[number];

/** What a drop says of a file beside its name. `sha256` once it is known; `options` what it will be measured under. */
export interface DroppedFile extends NamedFile {
  sha256?: string | null;
}

/** How much a row asks of whoever looks: nothing, a glance, a decision. */
export type Attention = 0 | 1 | 2;

export interface PreviewRow extends PlannedFile {
  outcome: Outcome;
  /** Label that the version will get, as far as it can be told; equal bytes change nothing in the end. */
  label: string | null;
  /** No folder names the category and nobody said it. */
  categoryGuessed: boolean;
  attention: Attention;
  /** Sentences that deserve a look before anything goes up, the weightiest first. */
  warnings: string[];
  /** Sentences that are only for the record. */
  notes: string[];
}

/** The versions of an asset as they will stand when the files before this one are through. */
interface Standing {
  highest: number;
  /** Takes of a number, and hash and options of its newest one, where they are known. */
  numbers: Map<number, { takes: number; content: string | null }>;
}

const NO_VERSION = -1;

function standingOf(known: KnownAsset | undefined): Standing {
  const numbers: Standing['numbers'] = new Map();
  for (const number of known?.versions ?? []) numbers.set(number, { takes: (numbers.get(number)?.takes ?? 0) + 1, content: null });
  for (const { number, take, sha256, options } of known?.contents ?? []) numbers.set(number, { takes: take, content: `${sha256} ${options}` });
  let highest = NO_VERSION;
  for (const number of numbers.keys()) highest = Math.max(highest, number);
  return { highest, numbers };
}

/**
 * What will happen to each file, given what the show has: the same plan as the server's, and the same rules of versions and takes.
 * Aligned with `files`.
 * @param options what the files will be measured under; without them nothing is said to be unchanged
 */
export function previewImport(files: readonly DroppedFile[], pattern: string | null, known: readonly KnownAsset[], options: OptionsOfMeasure | null = null): PreviewRow[] {
  const planned = planImport(files, pattern, known);
  const knownOf = new Map(known.map((asset) => [asset.asset, asset]));
  const lowerOf = new Map(known.map((asset) => [asset.asset.toLowerCase(), asset.asset]));
  const sharing = new Map<string, string[]>();
  for (const { asset, name } of known) {
    if (name === undefined) continue;
    const others = sharing.get(name);
    if (others) others.push(asset);
    else sharing.set(name, [asset]);
  }
  const standings = new Map<string, Standing>();
  const word = options === null ? null : optionsWord(options);
  const rows = new Array<PreviewRow>(files.length);
  const order = planned.map((_, index) => index).sort((a, b) => compareInProcessingOrder(planned[a], planned[b]));
  for (const index of order) {
    const [plan, file] = [planned[index], files[index]];
    const asset = plan.asset === null ? undefined : knownOf.get(plan.asset);
    if (plan.asset === null) {
      rows[index] = { ...plan, outcome: 'unmatched', label: null, categoryGuessed: false, attention: 2, warnings: ['The name does not match. Give an asset or leave it out.'], notes: [] };
      continue;
    }
    const standing = standings.get(plan.asset) ?? standingOf(asset);
    standings.set(plan.asset, standing);
    const content = file.sha256 && word !== null ? `${file.sha256} ${word}` : null;
    const row = placeVersion(plan, standing, content);
    const otherCase = asset ? undefined : lowerOf.get(plan.asset.toLowerCase());
    if (otherCase !== undefined) row.warnings.push(`The show has ${otherCase}; this one differs in upper and lower case only.`);
    const others = asset || plan.qualified ? [] : (sharing.get(plan.readName ?? '') ?? []);
    if (others.length > 0) row.warnings.push(`${others.join(' and ')} ${others.length === 1 ? 'has' : 'have'} this name; without its folder the file is another asset.`);
    row.categoryGuessed = row.outcome === 'new_asset' && !file.category && !readPath(file.name, pattern).saysCategory;
    row.attention = row.warnings.length > 0 ? 1 : 0;
    rows[index] = asset ? { ...row, category: asset.category } : row;
  }
  return rows;
}

/** Puts one file under its asset, and notes that it will stand there. */
function placeVersion(plan: PlannedFile, standing: Standing, content: string | null): PreviewRow {
  const { highest, numbers } = standing;
  const isNew = highest === NO_VERSION;
  const row: PreviewRow = { ...plan, outcome: isNew ? 'new_asset' : 'new_version', label: null, categoryGuessed: false, attention: 0, warnings: [], notes: [] };
  const { warnings, notes } = row;
  if (plan.qualified) (isNew ? warnings : notes).push(`${plan.readName} is in another folder too: the folder joins the code.`);
  if (plan.moved) (plan.moved.elsewhere ? warnings : notes).push(`${plan.asset} came from ${plan.moved.from} until now.`);
  const same = [highest, plan.version].find((number) => number !== null && content !== null && numbers.get(number)?.content === content);
  if (same !== undefined && same !== null) {
    notes.push('The same bytes and options are here already.');
    return { ...row, outcome: 'unchanged', label: versionLabel(same, numbers.get(same)!.takes) };
  }
  const number = plan.version ?? (isNew ? 1 : highest + 1);
  const takes = numbers.get(number)?.takes ?? 0;
  const label = versionLabel(number, takes + 1);
  if (plan.duplicate) warnings.push(plan.version === null ? 'Two files of this drop are this asset without a version; they follow each other.' : 'Two files of this drop have this asset and version; the later one becomes the next take.');
  else if (takes > 0) warnings.push(`${versionLabel(number, 1)} exists; other bytes become ${label}.`);
  else if (!isNew && number > highest + 1) warnings.push(`Nothing between ${versionLabel(highest, 1)} and ${versionLabel(number, 1)} is here.`);
  else if (number < highest) warnings.push(`${versionLabel(highest, 1)} stays the current version; this one will not become current.`);
  if (plan.version === null && !isNew && !plan.duplicate) warnings.push(`The name has no version, so it becomes ${versionLabel(number, 1)}.`);
  numbers.set(number, { takes: takes + 1, content });
  standing.highest = Math.max(highest, number);
  return { ...row, outcome: takes > 0 ? 'next_take' : row.outcome, label };
}

/** Files whose hash may show that nothing would change: another of the same size stands where they go, or comes with them. Indices. */
export function worthHashing(files: readonly { size: number }[], rows: readonly PlannedFile[], known: readonly KnownAsset[]): number[] {
  const sizes = new Map<string, number>();
  const note = (asset: string, bytes: number): void => void sizes.set(`${asset}\n${bytes}`, (sizes.get(`${asset}\n${bytes}`) ?? 0) + 1);
  for (const { asset, contents } of known) for (const { bytes } of contents ?? []) note(asset, bytes);
  rows.forEach((row, index) => row.asset !== null && note(row.asset, files[index].size));
  return rows.flatMap((row, index) => (row.asset !== null && sizes.get(`${row.asset}\n${files[index].size}`)! > 1 ? [index] : []));
}
