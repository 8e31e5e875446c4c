import { createHash, randomUUID } from 'node:crypto';
import { mkdir, open, readdir, rename, rm } from 'node:fs/promises';
import path from 'node:path';
import { config } from '@/lib/config';

/** A finished export on disk. */
export interface ExportFile {
  path: string;
  sha256: string;
  rows: number;
  byteSize: number;
}

const MAX_FILES = 64;
const MAX_BYTES = 1024 ** 3;

/** Least recently used first. */
const kept = new Map<string, ExportFile>();
const running = new Map<string, Promise<ExportFile>>();
let swept: Promise<string> | null = null;

/** The folder of exports; what an earlier process left there is of no use without its hashes. */
function exportFolder(): Promise<string> {
  swept ??= (async () => {
    const folder = path.join(config().dataFolder, 'cache', 'exports');
    await mkdir(folder, { recursive: true });
    for (const name of await readdir(folder)) await rm(path.join(folder, name), { force: true });
    return folder;
  })();
  return swept;
}

/** The export under the key, if it is still there. */
export function findExport(key: string): ExportFile | null {
  const found = kept.get(key) ?? null;
  if (found) {
    kept.delete(key);
    kept.set(key, found);
  }
  return found;
}

export function forgetExport(key: string): void {
  kept.delete(key);
}

/**
 * Writes an export to disk while hashing it, once per key however many ask at the same time, and keeps the newest within 64 files
 * and 1 GiB. `write` hands text over in pieces and answers the number of rows.
 */
export function keepExport(key: string, write: (put: (text: string) => Promise<void>) => Promise<number>): Promise<ExportFile> {
  const found = findExport(key);
  if (found) return Promise.resolve(found);
  let made = running.get(key);
  if (!made) {
    made = makeExport(key, write).finally(() => running.delete(key));
    running.set(key, made);
  }
  return made;
}

async function makeExport(key: string, write: (put: (text: string) => Promise<void>) => Promise<number>): Promise<ExportFile> {
  const folder = await exportFolder();
  const unfinished = path.join(folder, `${randomUUID()}.part`);
  const handle = await open(unfinished, 'wx');
  try {
    const hash = createHash('sha256');
    let byteSize = 0;
    const rows = await write(async (text) => {
      const bytes = Buffer.from(text, 'utf8');
      hash.update(bytes);
      byteSize += bytes.length;
      await handle.writeFile(bytes);
    });
    await handle.close();
    const file: ExportFile = { path: path.join(folder, key), sha256: hash.digest('hex'), rows, byteSize };
    await rename(unfinished, file.path);
    kept.set(key, file);
    await evict();
    return file;
  } catch (error) {
    await handle.close().catch(() => undefined);
    await rm(unfinished, { force: true });
    throw error;
  }
}

/** A file that is being sent stays readable through its open handle. */
async function evict(): Promise<void> {
  const total = (): number => [...kept.values()].reduce((sum, file) => sum + file.byteSize, 0);
  while (kept.size > 1 && (kept.size > MAX_FILES || total() > MAX_BYTES)) {
    const [[key, file]] = kept;
    kept.delete(key);
    await rm(file.path, { force: true });
  }
}
