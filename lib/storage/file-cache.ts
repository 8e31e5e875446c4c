import { randomUUID } from 'node:crypto';
import { mkdir, readdir, rename, rm } from 'node:fs/promises';
import path from 'node:path';
import { config } from '@/lib/config';

/** A finished file of a cache: where it lies, and the hash and size of its bytes. */
export interface CachedFile {
  path: string;
  /** Lower-case hex. */
  sha256: string;
  byteSize: number;
}

/**
 * Files that can be made again, under `cache/<name>` of the data folder, bounded in number and bytes; the least recently used go first.
 * A file is made once however many ask for it at the same time. What an earlier process left is removed at the first use.
 */
export class FileCache<File extends CachedFile> {
  private readonly kept = new Map<string, File>();
  private readonly running = new Map<string, Promise<File>>();
  private folder: Promise<string> | null = null;

  constructor(
    private readonly name: string,
    private readonly limits: { files: number; bytes: number },
  ) {}

  find(key: string): File | null {
    const found = this.kept.get(key);
    if (!found) return null;
    this.kept.delete(key);
    this.kept.set(key, found);
    return found;
  }

  forget(key: string): void {
    this.kept.delete(key);
  }

  /** The file under the key; `write` fills a path of its own when there is none yet. The key has to be a plain file name. */
  keep(key: string, write: (unfinished: string) => Promise<Omit<File, 'path'>>): Promise<File> {
    const found = this.find(key);
    if (found) return Promise.resolve(found);
    let made = this.running.get(key);
    if (!made) {
      made = this.make(key, write).finally(() => this.running.delete(key));
      this.running.set(key, made);
    }
    return made;
  }

  private async make(key: string, write: (unfinished: string) => Promise<Omit<File, 'path'>>): Promise<File> {
    this.folder ??= emptyFolder(this.name);
    const folder = await this.folder;
    const unfinished = path.join(folder, `${randomUUID()}.part`);
    try {
      const about = await write(unfinished);
      const file = { ...about, path: path.join(folder, key) } as File;
      await rename(unfinished, file.path);
      this.kept.set(key, file);
      await this.evict();
      return file;
    } catch (error) {
      await rm(unfinished, { force: true });
      throw error;
    }
  }

  /** A file that is being sent stays readable through its open handle. */
  private async evict(): Promise<void> {
    let bytes = 0;
    for (const file of this.kept.values()) bytes += file.byteSize;
    for (const [key, file] of this.kept) {
      if (this.kept.size <= 1 || (this.kept.size <= this.limits.files && bytes <= this.limits.bytes)) return;
      this.kept.delete(key);
      bytes -= file.byteSize;
      await rm(file.path, { force: true });
    }
  }
}

async function emptyFolder(name: string): Promise<string> {
  const folder = path.join(config().dataFolder, 'cache', name);
  await mkdir(folder, { recursive: true });
  for (const entry of await readdir(folder)) await rm(path.join(folder, entry), { recursive: true, force: true });
  return folder;
}
