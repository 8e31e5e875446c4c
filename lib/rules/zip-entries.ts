/** One entry of a ZIP as its central directory has it; nothing is unpacked. */
export interface ZipEntry {
  /** Path with forward slashes. */
  name: string;
  /** Unpacked and packed size, bytes, as declared. */
  bytes: number;
  packedBytes: number;
}

/** Part of a file: a browser's `File` or `Blob` is one, read a slice at a time. */
export interface Sliceable {
  size: number;
  slice(start: number, end: number): { arrayBuffer(): Promise<ArrayBuffer> };
}

/** Signatures and lengths of the records, after the ZIP format's APPNOTE (from memory). */
const END_RECORD = 0x06054b50;
const END_BYTES = 22;
const MOST_COMMENT = 65_535;
const DIRECTORY_RECORD = 0x02014b50;
const DIRECTORY_BYTES = 46;
/** What is larger than four bytes say lies in records of their own, which are not read here. */
const BEYOND = 0xffffffff;
const MOST_DIRECTORY_BYTES = 64 * 1024 * 1024;
const UTF8_NAME = 0x0800;

/**
 * Lists the files of a ZIP from its last bytes, in the order of its directory, folders and what archivers leave beside the files left out. Null where it is no
 * plain ZIP (another file, one beyond 4 GB, a damaged one): the import reads it all the same and says what is wrong. Rejects where a slice cannot be read.
 */
export async function listZipEntries(file: Sliceable): Promise<ZipEntry[] | null> {
  const tailStart = Math.max(0, file.size - END_BYTES - MOST_COMMENT);
  const tail = new DataView(await file.slice(tailStart, file.size).arrayBuffer());
  const end = findEnd(tail);
  if (end < 0) return null;
  const [count, bytes, start] = [tail.getUint16(end + 10, true), tail.getUint32(end + 12, true), tail.getUint32(end + 16, true)];
  if (start === BEYOND || bytes === BEYOND || bytes > MOST_DIRECTORY_BYTES || start + bytes > file.size) return null;
  return readDirectory(new DataView(await file.slice(start, start + bytes).arrayBuffer()), count);
}

/** The end record closest to the file's end whose comment reaches to it; -1 where there is none. */
function findEnd(tail: DataView): number {
  for (let at = tail.byteLength - END_BYTES; at >= 0; at--) {
    if (tail.getUint32(at, true) === END_RECORD && at + END_BYTES + tail.getUint16(at + 20, true) === tail.byteLength) return at;
  }
  return -1;
}

function readDirectory(view: DataView, count: number): ZipEntry[] | null {
  const entries: ZipEntry[] = [];
  let at = 0;
  for (let i = 0; i < count; i++) {
    if (at + DIRECTORY_BYTES > view.byteLength || view.getUint32(at, true) !== DIRECTORY_RECORD) return null;
    const nameLength = view.getUint16(at + 28, true);
    const nameStart = at + DIRECTORY_BYTES;
    if (nameStart + nameLength > view.byteLength) return null;
    const name = nameOf(new Uint8Array(view.buffer, view.byteOffset + nameStart, nameLength), (view.getUint16(at + 8, true) & UTF8_NAME) !== 0);
    const isFile = !name.endsWith('/') && !/(^|\/)(__MACOSX\/|\.)/.test(name);
    if (isFile) entries.push({ name, bytes: view.getUint32(at + 24, true), packedBytes: view.getUint32(at + 20, true) });
    at = nameStart + nameLength + view.getUint16(at + 30, true) + view.getUint16(at + 32, true);
  }
  return entries;
}

/** Names without the mark of UTF-8 are of an old code page, of which the letters that all share are enough for a preview. */
function nameOf(bytes: Uint8Array, isUtf8: boolean): string {
  const name = isUtf8 ? new TextDecoder().decode(bytes) : String.fromCharCode(...bytes);
  return name.replaceAll('\\', '/');
}
