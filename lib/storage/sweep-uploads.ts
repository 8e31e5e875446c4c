import { readdir, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { uploadsFolder } from './disk';

const DAY_MS = 24 * 60 * 60 * 1000;

/** Removes temporary files of uploads whose process died, once they are a day old. Answers how many. */
export async function sweepUploads(now = Date.now()): Promise<number> {
  const names = await readdir(uploadsFolder()).catch(() => []);
  let removed = 0;
  for (const name of names) {
    const file = path.join(uploadsFolder(), name);
    const found = await stat(file).catch(() => null);
    if (!found || now - found.mtimeMs < DAY_MS) continue;
    await rm(file, { force: true });
    removed++;
  }
  return removed;
}
