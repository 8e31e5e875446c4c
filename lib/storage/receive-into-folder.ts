import { randomUUID } from 'node:crypto';
import { link, mkdir, open, rm, type FileHandle } from 'node:fs/promises';
import path from 'node:path';
import { pathInFolder, UNFINISHED } from './disk';
import type { Landing } from './receive-bytes';

/** A temporary file on the same volume as the blobs, flushed before it gets its name. */
export async function receiveIntoFolder(): Promise<Landing> {
  const temporary = pathInFolder(`${UNFINISHED}/${randomUUID()}`);
  await mkdir(path.dirname(temporary), { recursive: true });
  let file: FileHandle | null = await open(temporary, 'wx');
  const shut = async () => {
    const open = file;
    file = null;
    await open?.close();
  };
  return {
    write: async (chunk) => {
      if (file) await file.writeFile(chunk);
    },
    close: async () => {
      await file?.sync();
      await shut();
    },
    place: async (key) => {
      const target = pathInFolder(key);
      // Twice, because a sweep may remove the empty folder in between.
      await linkWithin(temporary, target).catch((error: NodeJS.ErrnoException) => {
        if (error.code !== 'ENOENT') throw error;
        return linkWithin(temporary, target);
      });
      await flushFolder(path.dirname(target));
    },
    discard: async () => {
      await shut().catch(() => undefined);
      await rm(temporary, { force: true });
    },
  };
}

/** A link, not a rename: it fails where the name is taken, so that stored bytes are never written over. */
async function linkWithin(temporary: string, target: string): Promise<void> {
  await mkdir(path.dirname(target), { recursive: true });
  await link(temporary, target).catch((error: NodeJS.ErrnoException) => {
    if (error.code !== 'EEXIST') throw error;
  });
}

/** A name lasts once its folder is on the volume. */
async function flushFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}
