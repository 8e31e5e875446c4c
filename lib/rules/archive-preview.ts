import { extensionOf } from './file-extension';
import type { Attention, Outcome, PreviewRow } from './import-preview';
import { isSideFile } from './side-files';
import type { ZipEntry } from './zip-entries';

/** What is going to come out of a dropped archive. */
export interface ArchivePreview {
  files: number;
  /** How many of them become what. */
  outcomes: ReadonlyMap<Outcome, number>;
  attention: Attention;
  /** Paths inside the archive, each with its weightiest warning. */
  warnings: { entry: string; words: string }[];
}

/**
 * The entries of an archive that become files of their own, in the order of their names; null where it holds one mesh, and is that mesh. As the import unpacks it,
 * except that layers which a USD file among them refers to are counted too: nobody has read it yet.
 * @param extensions of mesh files, lower case, without the dot
 */
export function filesOfArchive(entries: readonly ZipEntry[], extensions: readonly string[]): string[] | null {
  const meshes = entries.map(({ name }) => name).filter((name) => extensions.includes(extensionOf(name)) && !isSideFile(name));
  const isSeveral = meshes.length > 1 || meshes.some((name) => ['zip', 'usdz'].includes(extensionOf(name)));
  return isSeveral ? meshes.sort() : null;
}

/** Path that an entry of a dropped archive goes by once it is unpacked. */
export function unpackedPath(archive: string, entry: string): string {
  return `${archive.replace(/\.zip$/i, '')}/${entry.normalize('NFC')}`;
}

/** Sums up what the previews of an archive's entries say. `rows` is aligned with `entries`. */
export function summariseArchive(entries: readonly string[], rows: readonly PreviewRow[]): ArchivePreview {
  const outcomes = new Map<Outcome, number>();
  let attention: Attention = 0;
  for (const row of rows) {
    outcomes.set(row.outcome, (outcomes.get(row.outcome) ?? 0) + 1);
    if (row.attention > attention) attention = row.attention;
  }
  const warnings = rows.flatMap((row, index) => (row.warnings.length > 0 ? [{ entry: entries[index], words: row.warnings[0], attention: row.attention }] : []));
  return { files: rows.length, outcomes, attention, warnings: warnings.sort((a, b) => b.attention - a.attention).map(({ entry, words }) => ({ entry, words })) };
}
