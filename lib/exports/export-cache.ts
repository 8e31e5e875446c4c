import { createHash } from 'node:crypto';
import { open } from 'node:fs/promises';
import { FileCache, type CachedFile } from '@/lib/storage/file-cache';

/** A finished export on disk. */
export interface ExportFile extends CachedFile {
  rows: number;
}

export const exportCache = new FileCache<ExportFile>('exports', { files: 64, bytes: 1024 ** 3 });

/** Writes an export to a file while hashing it. `write` hands text over in pieces and answers the number of rows. */
export async function spoolExport(path: string, write: (put: (text: string) => Promise<void>) => Promise<number>): Promise<Omit<ExportFile, 'path'>> {
  const handle = await open(path, 'wx');
  try {
    const hash = createHash('sha256');
    let byteSize = 0;
    const rows = await write(async (text) => {
      const bytes = Buffer.from(text, 'utf8');
      hash.update(bytes);
      byteSize += bytes.length;
      await handle.writeFile(bytes);
    });
    return { sha256: hash.digest('hex'), rows, byteSize };
  } finally {
    await handle.close();
  }
}
