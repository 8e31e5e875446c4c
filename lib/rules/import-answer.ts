import type { BoundaryWord, PartitionWord, SchemeWord } from './measure-words';
import type { KnownAsset } from './known-asset';
import type { ImportFileState, ImportState } from './states';

/** What happened to a file beside its end. Codes as the API has them, with their sentences. */
export const REMARKS = {
  unchanged: 'The same bytes and options as the current version: nothing changed.',
  next_take: 'Another file has this number already, so this one is its next take.',
  gap: 'Versions between the last one and this one are not here.',
  no_number: 'The name has no version, so it got the next number.',
  not_current: 'A later version stays the current one.',
  qualified: 'The same name came from another folder too, so the folder is part of the asset’s code.',
  unit_too_small: 'The whole asset measures less than 5 mm. The file’s unit does not look like the show’s.',
  unit_too_large: 'The whole asset measures more than 200 m. The file’s unit does not look like the show’s.',
  unit_unlike_before: 'This version is larger or smaller than the one before by the ratio of two units. Export it in the show’s unit.',
  unit_unlike_show: 'The whole asset is more than 50 times larger or smaller than the show’s assets usually are. Check the unit of the file.',
  converted_unit: 'The file states another unit than the show’s: its lengths were converted.',
  turned_axis: 'The file states another up axis than the show’s: it was turned by a quarter about X.',
  unpacked: 'The archive became files of its own.',
  read_beside: 'Read with the mesh beside it.',
} as const;
export type Remark = keyof typeof REMARKS;

/** Whether a remark doubts the unit that a file was written in. */
export const doubtsUnit = (remark: Remark): boolean => remark.startsWith('unit_');

/** Remarks that deserve a look; the others are for the record. */
export const LOUD_REMARKS: readonly Remark[] = ['unit_too_small', 'unit_too_large', 'unit_unlike_before', 'unit_unlike_show', 'converted_unit', 'turned_axis', 'next_take', 'gap', 'qualified'];

/** Largest dimension of an asset, metres, outside which its unit is doubted. */
export const SMALLEST_ASSET_M = 0.005;
export const LARGEST_ASSET_M = 200;

export interface ImportFileError {
  code: string;
  message: string;
  line: number | null;
  column: number | null;
  /** The line with a caret under the column; null where the whole file is meant. */
  excerpt?: string | null;
}

/** A fault that may pass: storage or database out of reach, a worker that fell silent. */
export interface FileTrouble {
  /** How often the file was begun. */
  attempt: number;
  message: string;
  again_at: string;
}

/** Answer of GET …/imports/{id}/faults: one try of one file that ended in a fault which may pass. `again_at` is null where it was given up. */
export interface ImportFault {
  name: string;
  at: string;
  attempt: number;
  worker: string | null;
  code: string;
  message: string;
  again_at: string | null;
}

/** One file of an import. `size_m` is the box of the whole asset in its own axes, metres: x, y, z. */
export interface ImportFileAnswer {
  name: string;
  state: ImportFileState;
  asset: string | null;
  version: string | null;
  parts: number | null;
  problems: number | null;
  remarks: Remark[];
  size_m: [number, number, number] | null;
  sha256: string;
  bytes: number;
  error: ImportFileError | null;
  /** The last fault of a file that will be tried again, and when; null where there was none, and once it has ended. */
  trouble?: FileTrouble | null;
  /** Of an archive that became files of its own: how many. */
  unpacked_into?: number | null;
}

/** A finding of a file as its import shows it: the part by name, the first line of the file that it names. */
export interface FileFinding {
  code: string;
  severity: 'problem' | 'warning';
  message: string;
  part: string | null;
  count: number;
  line: number | null;
}

/** A file on a page of an import's files: with the first problems and warnings of its measurement, and how many there are. */
export interface ImportFileRow extends ImportFileAnswer {
  /** Where its name puts it, until it has its asset: code, and number if it has one. */
  planned: { asset: string; version: number | null } | null;
  warnings: number;
  findings: FileFinding[];
}

/** Findings that a page shows of one file; the report has all. */
export const FINDINGS_SHOWN = 8;

export const FILE_FILTERS = ['all', 'failed', 'problems', 'warnings', 'going', 'unchanged'] as const;
export type FileFilter = (typeof FILE_FILTERS)[number];

/** What needs somebody first; or by a column, `-` turns it round. */
export const FILE_SORTS = ['needs', 'name', '-name', 'asset', '-asset', 'parts', '-parts', 'problems', '-problems', 'bytes', '-bytes'] as const;
export type FileSort = (typeof FILE_SORTS)[number];

/** How many files each filter lets through. */
export type FileFilterCounts = Record<FileFilter, number>;

/** Answer of GET …/imports/{id}/files. `found` are the files that filter and search let through. */
export interface ImportFilePage {
  items: ImportFileRow[];
  counts: FileFilterCounts;
  found: number;
  next_cursor: string | null;
}

/** Files by state; `total` of them. */
export type ImportCounts = Record<ImportFileState, number> & { total: number };

export interface ImportAnswer {
  id: string;
  state: ImportState;
  /** Whether its waiting files are left alone until it is resumed. */
  paused: boolean;
  scheme: SchemeWord;
  boundary: BoundaryWord;
  parts_by: PartitionWord;
  /** Whether vertices on open borders that lie on each other are joined, and faces turned outwards, before measuring. */
  weld: boolean;
  turn_faces: boolean;
  created_by: string;
  created_at: string;
  submitted_at: string | null;
  ended_at: string | null;
  counts: ImportCounts;
  /** Until its end at the pace of the last two minutes; null while that cannot be told. */
  seconds_left?: number | null;
}

/** An import without its files, and how far this answer knows: sent as Last-Event-ID, …/events tells what came after it. */
export interface ImportSummary extends ImportAnswer {
  mark: string;
}

/** Answer of GET …/imports/{id}; with `since`, and in an event of …/events, it has the files that changed since then alone. */
export interface ImportDetail extends ImportSummary {
  files: ImportFileAnswer[];
}

export interface ImportPage {
  items: ImportAnswer[];
  /** Sent as Last-Event-ID, an import's …/events tells what came after this answer. */
  mark: string;
  next_cursor: string | null;
}

/** Answer of PUT …/files/{name}. `stored` is false when these bytes were there under this name already. */
export interface StoredFileAnswer {
  name: string;
  sha256: string;
  bytes: number;
  stored: boolean;
}

/** An import that somebody opened and did not submit: what arrived in it, and the options that its files would be measured under. */
export interface OpenImport {
  id: string;
  created_at: string;
  scheme: SchemeWord;
  boundary: BoundaryWord;
  parts_by: PartitionWord;
  weld: boolean;
  turn_faces: boolean;
  /** Its own; empty for the built-in rule, null for the show's. */
  name_pattern: string | null;
  /** Whether it is what a page would open today, the options above aside. */
  standard: boolean;
  /** Names of the files that arrived. */
  names: string[];
}

/** What the import page knows before anything goes up. */
export interface ImportPreparation {
  show: string;
  name_pattern: string | null;
  scheme: SchemeWord;
  boundary: BoundaryWord;
  parts_by: PartitionWord;
  linear_unit: string;
  up_axis: 'y' | 'z';
  frozen: boolean;
  extensions: string[];
  max_file_bytes: number;
  max_files: number;
  max_import_bytes: number;
  /** What show and studio have room for. */
  left_bytes: number;
  assets: KnownAsset[];
  /** The reader's own that were not submitted, newest first. */
  open: OpenImport[];
}
