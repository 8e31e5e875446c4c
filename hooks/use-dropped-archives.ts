'use client';

import { useEffect, useRef, useState } from 'react';
import { filesOfArchive } from '@/lib/rules/archive-preview';
import { extensionOf } from '@/lib/rules/file-extension';
import { listZipEntries } from '@/lib/rules/zip-entries';
import type { DroppedFile } from './desk-files';

/** Of each dropped ZIP that becomes several files, the entries that do, once its directory was read. */
export function useDroppedArchives(files: readonly DroppedFile[], extensions: readonly string[]): ReadonlyMap<File, readonly string[]> {
  const [archives, setArchives] = useState<ReadonlyMap<File, readonly string[]>>(new Map());
  const asked = useRef(new Set<File>());
  useEffect(() => {
    for (const { path, file } of files) {
      if (extensionOf(path) !== 'zip' || asked.current.has(file)) continue;
      asked.current.add(file);
      // What cannot be read is shown like any file: the import says what is wrong with it.
      void listZipEntries(file).catch(() => null).then((entries) => {
        const inside = entries === null ? null : filesOfArchive(entries, extensions);
        if (inside !== null) setArchives((now) => new Map(now).set(file, inside));
      });
    }
  }, [files, extensions]);
  return archives;
}
