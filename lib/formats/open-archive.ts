import { crc32 } from 'node:zlib';
import { fromBuffer, open as openZip, type Entry, type ZipFile } from 'yauzl';
import { MeshError } from './mesh-error';

/** What an archive may hold. The sizes are those that it declares; while a file is unpacked its true size is held to them. */
export interface ArchiveLimits {
  entries: number;
  nameLength: number;
  /** Unpacked bytes of all files together. */
  totalBytes: number;
  /** Unpacked bytes for one packed byte; texts of meshes reach about ten. */
  ratio: number;
}

/** Limits of an archive that is read whole, in memory. */
export const ARCHIVE_LIMITS: ArchiveLimits = { entries: 10_000, nameLength: 1_024, totalBytes: 1 << 30, ratio: 200 };

/** Small files may pack better than any ratio. */
const FREE_BYTES = 1 << 20;
const LINK = 0xa000;
const KIND_OF_FILE = 0xf000;
const ENCRYPTED = 1;

/** The files of an archive, and how to get at one. Folders are not listed. */
export interface Archive {
  names: string[];
  /** Unpacked bytes that the entry declares. */
  sizeOf(name: string): number;
  read(name: string): Promise<Uint8Array>;
  /** An entry piece by piece, in bounded memory; it fails at its end where size or checksum are not those that were declared. Errors: MeshError bad_archive. */
  stream(name: string): AsyncGenerator<Uint8Array>;
  /** Closes the file that it is read from; of bytes there is nothing to close. */
  close(): void;
}

const OPTIONS = { lazyEntries: true, decodeStrings: true, strictFileNames: true, validateEntrySizes: true, autoClose: false };

/** A clause about an entry, whose name may be long. */
function bad(code: string, name: string, detail: string): MeshError {
  return new MeshError({ code, found: name.slice(0, 200), detail: `archive entry "${name.length > 120 ? `${name.slice(0, 120)}…` : name}": ${detail}` });
}

/** Lists the files of an archive in memory after checking every entry. Errors: bad_archive, unsafe_name, link, encrypted, too_many_entries, too_large, bomb, duplicate. */
export async function openArchive(bytes: Uint8Array, limits = ARCHIVE_LIMITS): Promise<Archive> {
  const buffer = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  return checkedArchive(await opened((done) => fromBuffer(buffer, OPTIONS, done)), bytes.length, limits);
}

/** The same for a file on disk, of which only what is asked for is read. Close it. Errors: those of `openArchive`. */
export async function openArchiveFile(path: string, byteSize: number, limits: ArchiveLimits): Promise<Archive> {
  const zip = await opened((done) => openZip(path, OPTIONS, done));
  try {
    return await checkedArchive(zip, byteSize, limits);
  } catch (error) {
    zip.close();
    throw error;
  }
}

function opened(open: (done: (error: Error | null, zip: ZipFile) => void) => void): Promise<ZipFile> {
  return new Promise((resolve, reject) => open((error, zip) => (error ? reject(broken(error)) : resolve(zip))));
}

async function checkedArchive(zip: ZipFile, byteSize: number, limits: ArchiveLimits): Promise<Archive> {
  if (zip.entryCount > limits.entries) throw new MeshError({ code: 'too_many_entries', expected: `at most ${limits.entries} entries`, found: String(zip.entryCount), detail: `expected at most ${limits.entries} entries in the archive, found ${zip.entryCount}` });
  const entries = new Map<string, Entry>();
  let [packed, unpacked] = [0, 0];
  for (const entry of await listEntries(zip)) {
    packed += entry.compressedSize;
    unpacked += entry.uncompressedSize;
    checkEntry(entry, unpacked, limits);
    if (entry.fileName.endsWith('/')) continue;
    if (entries.has(entry.fileName)) throw bad('duplicate', entry.fileName, 'expected each name once');
    entries.set(entry.fileName, entry);
  }
  // Entries that share their bytes make a small archive large.
  if (packed > byteSize) throw new MeshError({ code: 'bomb', detail: `expected entries of at most the archive's own ${byteSize} bytes, found ${packed} packed` });
  return {
    names: [...entries.keys()],
    sizeOf: (name) => entries.get(name)!.uncompressedSize,
    read: (name) => collect(zip, entries.get(name)!),
    stream: (name) => unpack(zip, entries.get(name)!),
    close: () => zip.close(),
  };
}

function broken(error: Error): MeshError {
  const unsafe = /relative path|absolute path|invalid characters in fileName/i.test(error.message);
  const message = error.message.slice(0, 200);
  return new MeshError({ code: unsafe ? 'unsafe_name' : 'bad_archive', detail: unsafe ? `expected names within the archive: ${message}` : `the archive cannot be read: ${message}` });
}

function listEntries(zip: ZipFile): Promise<Entry[]> {
  return new Promise((resolve, reject) => {
    const found: Entry[] = [];
    zip.on('entry', (entry: Entry) => {
      found.push(entry);
      zip.readEntry();
    });
    zip.on('end', () => resolve(found));
    zip.on('error', (error: Error) => reject(broken(error)));
    zip.readEntry();
  });
}

function checkEntry(entry: Entry, unpacked: number, { nameLength, totalBytes, ratio }: ArchiveLimits): void {
  const { fileName, fileNameRaw, compressedSize, uncompressedSize, externalFileAttributes, generalPurposeBitFlag } = entry;
  if (fileName.length > nameLength) throw bad('name_too_long', fileName, `expected a name of at most ${nameLength} characters, found ${fileName.length}`);
  // Old names show control bytes as pictures, so the bytes themselves are looked at.
  if (fileNameRaw.some((byte) => byte < 0x20 || byte === 0x7f)) throw bad('unsafe_name', fileName, 'expected a name without control characters');
  if (((externalFileAttributes >>> 16) & KIND_OF_FILE) === LINK) throw bad('link', fileName, 'expected a file, found a link');
  if ((generalPurposeBitFlag & ENCRYPTED) !== 0) throw bad('encrypted', fileName, 'expected a file without a password');
  if (unpacked > totalBytes) throw bad('too_large', fileName, `expected at most ${totalBytes} bytes in all files of the archive, found more`);
  if (uncompressedSize > FREE_BYTES && uncompressedSize > ratio * compressedSize) throw bad('bomb', fileName, `expected at most ${ratio} bytes unpacked from one, found ${uncompressedSize} from ${compressedSize}`);
}

async function* unpack(zip: ZipFile, entry: Entry): AsyncGenerator<Uint8Array> {
  const fail = (error: unknown) => bad('bad_archive', entry.fileName, `it cannot be unpacked: ${error instanceof Error ? error.message.slice(0, 200) : 'unknown fault'}`);
  let at = 0;
  let sum = 0;
  try {
    for await (const chunk of await openEntry(zip, entry)) {
      at += chunk.length;
      if (at > entry.uncompressedSize) throw new Error('it is larger than it says');
      sum = crc32(chunk, sum);
      yield chunk;
    }
  } catch (error) {
    throw fail(error);
  }
  if (at !== entry.uncompressedSize || sum !== entry.crc32) throw fail(new Error('its checksum does not match'));
}

/** yauzl throws at once for a way of packing that it does not know, and calls back for what it finds later. */
function openEntry(zip: ZipFile, entry: Entry): Promise<AsyncIterable<Buffer>> {
  return new Promise((resolve, reject) => zip.openReadStream(entry, (error, stream) => (error ? reject(error) : resolve(stream))));
}

async function collect(zip: ZipFile, entry: Entry): Promise<Uint8Array> {
  const out = new Uint8Array(entry.uncompressedSize);
  let at = 0;
  for await (const chunk of unpack(zip, entry)) {
    out.set(chunk, at);
    at += chunk.length;
  }
  return out;
}
