import { createHash } from 'node:crypto';
import { open } from 'node:fs/promises';
import { FileCache, type CachedFile } from '@/lib/storage/file-cache';
import type { ExportCells } from './export-pages';
import { packHandedRows } from './handed-rows';

/** A finished export on disk: the bytes that are sent, and behind them what its rows are (see packHandedRows). */
export interface ExportFile extends CachedFile {
  rows: number;
}

export const exportCache = new FileCache<ExportFile>('exports', { files: 64, bytes: 1024 ** 3 });

/** Writes an export to a file while hashing it. `write` hands text over in pieces, with the rows that each piece holds. */
export async function spoolExport(path: string, write: (put: (text: string, rows?: readonly ExportCells[]) => Promise<void>) => Promise<void>): Promise<Omit<ExportFile, 'path'>> {
  const handle = await open(path, 'wx');
  try {
    const hash = createHash('sha256');
    let byteSize = 0;
    const handed: Buffer[] = [];
    let rows = 0;
    await write(async (text, cells = []) => {
      const bytes = Buffer.from(text, 'utf8');
      hash.update(bytes);
      byteSize += bytes.length;
      await handle.writeFile(bytes);
      if (cells.length > 0) handed.push(packHandedRows(cells));
      rows += cells.length;
    });
    for (const block of handed) await handle.writeFile(block);
    return { sha256: hash.digest('hex'), rows, byteSize };
  } finally {
    await handle.close();
  }
}
