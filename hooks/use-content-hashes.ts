'use client';

import { useEffect, useRef, useState } from 'react';
import { DEFAULT_PART_BYTES } from '@/lib/rules/upload-parts';
import { hashFile } from './hash-file';

/** A larger file is not read for the preview alone: it is hashed when it goes up. */
const MOST_BYTES = 256 * 1024 * 1024;
const DRAW_MS = 200;

/** SHA-256 of the wanted files, one after the other as they become known. What cannot be read stays unknown. */
export function useContentHashes(wanted: readonly File[]): ReadonlyMap<File, string> {
  const [hashes, setHashes] = useState<ReadonlyMap<File, string>>(new Map());
  const known = useRef(new Map<File, string | null>());
  useEffect(() => {
    let isOver = false;
    const waiting = wanted.filter((file) => file.size <= MOST_BYTES && !known.current.has(file));
    if (waiting.length === 0) return;
    const draw = () => setHashes(new Map([...known.current].filter((entry): entry is [File, string] => entry[1] !== null)));
    const timer = setInterval(draw, DRAW_MS);
    const work = async () => {
      for (const file of waiting) {
        if (isOver) return;
        const sha256 = await hashFile(file, DEFAULT_PART_BYTES, () => undefined).then((hash) => hash.sha256, () => null);
        known.current.set(file, sha256);
      }
      clearInterval(timer);
      if (!isOver) draw();
    };
    void work();
    return () => {
      isOver = true;
      clearInterval(timer);
    };
  }, [wanted]);
  return hashes;
}
