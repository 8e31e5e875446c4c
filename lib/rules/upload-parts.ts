/** Bytes of a part unless the sender says another size; files up to that size go up at once. */
export const DEFAULT_PART_BYTES = 8 * 1024 * 1024;
export const SMALLEST_PART_BYTES = 64 * 1024;
export const LARGEST_PART_BYTES = 64 * 1024 * 1024;
export const MOST_PARTS = 10_000;

interface Parted {
  bytes: number;
  part_bytes: number;
}

/** How many parts a file of `bytes` has, and how many bytes the one with this number (from 1) has. */
export const partCount = ({ bytes, part_bytes }: Parted): number => Math.ceil(bytes / part_bytes);
export const partLength = ({ bytes, part_bytes }: Parted, number: number): number => Math.min(part_bytes, bytes - (number - 1) * part_bytes);

/** Answer of the calls about an upload in parts. */
export interface UploadAnswer {
  /** `open`: parts are missing. `assembling`: all came, ask again. `stored`: the content is in the import under the name. */
  state: 'open' | 'assembling' | 'stored';
  /** Null where no bytes are needed. */
  upload: string | null;
  sha256: string;
  bytes: number;
  part_bytes: number;
  part_count: number;
  /** Numbers of the parts that are there. */
  parts: number[];
  expires_at: string | null;
}

/** Answer of PUT …/parts/{part}. `stored` is false when these bytes were there already. */
export interface UploadPartAnswer {
  part: number;
  sha256: string;
  bytes: number;
  stored: boolean;
}

/** Answer of POST …/known, in the order asked: `stored` files are in the import, of `needed` ones the bytes have to come. */
export interface KnownFilesAnswer {
  items: { name: string; state: 'stored' | 'needed' }[];
}

/** What may go up into a show, told before anything does. `left_bytes` is what show and studio have room for. */
export interface UploadLimits {
  max_file_bytes: number;
  max_files: number;
  max_import_bytes: number;
  max_show_bytes: number;
  left_bytes: number;
  part_bytes: number;
}
