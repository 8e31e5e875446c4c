import { crc32 } from 'node:zlib';
import { fromBuffer, type Entry, type ZipFile } from 'yauzl';
import { MeshError } from './mesh-error';

/** What an archive may hold. The sizes are those that it declares; while a file is unpacked its true size is held to them. */
export const ARCHIVE_LIMITS = {
  entries: 10_000,
  nameLength: 1_024,
  /** Unpacked bytes of all files together. */
  totalBytes: 1 << 30,
  /** Unpacked bytes for one packed byte; texts of meshes reach about ten. */
  ratio: 200,
};

/** Small files may pack better than any ratio. */
const FREE_BYTES = 1 << 20;
const LINK = 0xa000;
const KIND_OF_FILE = 0xf000;
const ENCRYPTED = 1;

/** The files of an archive, and how to get at one. Folders are not listed. */
export interface Archive {
  names: string[];
  read(name: string): Promise<Uint8Array>;
}

/** A clause about an entry, whose name may be long. */
function bad(code: string, name: string, detail: string): MeshError {
  return new MeshError({ code, found: name.slice(0, 200), detail: `archive entry "${name.length > 120 ? `${name.slice(0, 120)}…` : name}": ${detail}` });
}

/** Lists an archive's files after checking every entry. Errors: bad_archive, unsafe_name, link, encrypted, too_many_entries, too_large, bomb, duplicate. */
export async function openArchive(bytes: Uint8Array): Promise<Archive> {
  const buffer = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const zip = await new Promise<ZipFile>((resolve, reject) =>
    fromBuffer(buffer, { lazyEntries: true, decodeStrings: true, strictFileNames: true, validateEntrySizes: true }, (error, file) => (error ? reject(broken(error)) : resolve(file))),
  );
  if (zip.entryCount > ARCHIVE_LIMITS.entries) throw new MeshError({ code: 'too_many_entries', expected: `at most ${ARCHIVE_LIMITS.entries} entries`, found: String(zip.entryCount), detail: `expected at most ${ARCHIVE_LIMITS.entries} entries in the archive, found ${zip.entryCount}` });
  const entries = new Map<string, Entry>();
  let [packed, unpacked] = [0, 0];
  for (const entry of await listEntries(zip)) {
    packed += entry.compressedSize;
    unpacked += entry.uncompressedSize;
    checkEntry(entry, unpacked);
    if (entry.fileName.endsWith('/')) continue;
    if (entries.has(entry.fileName)) throw bad('duplicate', entry.fileName, 'expected each name once');
    entries.set(entry.fileName, entry);
  }
  // Entries that share their bytes make a small archive large.
  if (packed > bytes.length) throw new MeshError({ code: 'bomb', detail: `expected entries of at most the archive's own ${bytes.length} bytes, found ${packed} packed` });
  return { names: [...entries.keys()], read: (name) => unpack(zip, entries.get(name)!) };
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

function checkEntry(entry: Entry, unpacked: number): void {
  const { fileName, fileNameRaw, compressedSize, uncompressedSize, externalFileAttributes, generalPurposeBitFlag } = entry;
  const { nameLength, totalBytes, ratio } = ARCHIVE_LIMITS;
  if (fileName.length > nameLength) throw bad('name_too_long', fileName, `expected a name of at most ${nameLength} characters, found ${fileName.length}`);
  // Old names show control bytes as pictures, so the bytes themselves are looked at.
  if (fileNameRaw.some((byte) => byte < 0x20 || byte === 0x7f)) throw bad('unsafe_name', fileName, 'expected a name without control characters');
  if (((externalFileAttributes >>> 16) & KIND_OF_FILE) === LINK) throw bad('link', fileName, 'expected a file, found a link');
  if ((generalPurposeBitFlag & ENCRYPTED) !== 0) throw bad('encrypted', fileName, 'expected a file without a password');
  if (unpacked > totalBytes) throw bad('too_large', fileName, `expected at most ${totalBytes} bytes in all files of the archive, found more`);
  if (uncompressedSize > FREE_BYTES && uncompressedSize > ratio * compressedSize) throw bad('bomb', fileName, `expected at most ${ratio} bytes unpacked from one, found ${uncompressedSize} from ${compressedSize}`);
}

function unpack(zip: ZipFile, entry: Entry): Promise<Uint8Array> {
  return new Promise((resolve, reject) => {
    const fail = (error: Error) => reject(bad('bad_archive', entry.fileName, `it cannot be unpacked: ${error.message.slice(0, 200)}`));
    // yauzl throws at once for a way of packing that it does not know, and calls back for what it finds later.
    try {
      zip.openReadStream(entry, (error, stream) => {
        if (error) return fail(error);
        const out = new Uint8Array(entry.uncompressedSize);
        let at = 0;
        stream.on('data', (chunk: Buffer) => {
          if (at + chunk.length > out.length) return stream.destroy(new Error('it is larger than it says'));
          out.set(chunk, at);
          at += chunk.length;
        });
        stream.on('error', fail);
        stream.on('end', () => {
          if (at !== out.length || crc32(out) !== entry.crc32) fail(new Error('its checksum does not match'));
          else resolve(out);
        });
      });
    } catch (error) {
      fail(error instanceof Error ? error : new Error('unknown fault'));
    }
  });
}
