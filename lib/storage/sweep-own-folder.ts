import { readdir, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { pathInFolder, UNFINISHED } from './disk';

/** Older than any archive that is still being unpacked. */
const DAY_MS = 24 * 3_600_000;

/**
 * Removes what this machine's own folder keeps of work that died, once it is a day old: archives lie there while they are unpacked, where the storage is a
 * bucket too, and no other machine can remove them. Answers how many.
 */
export async function sweepOwnFolder(now = Date.now()): Promise<number> {
  const folder = pathInFolder(UNFINISHED);
  let removed = 0;
  for (const name of await readdir(folder).catch(() => [])) {
    const file = path.join(folder, name);
    const about = await stat(file).catch(() => null);
    if (!about?.isFile() || now - about.mtimeMs < DAY_MS) continue;
    await rm(file, { force: true });
    removed++;
  }
  return removed;
}
