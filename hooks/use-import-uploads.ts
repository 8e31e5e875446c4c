'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { DEFAULT_PART_BYTES, type KnownFilesAnswer } from '@/lib/rules/upload-parts';
import { hashFile } from './hash-file';
import type { FileHashes } from './hash-parts';
import { patiently } from './patiently';
import { RequestLanes } from './request-lanes';
import { requestJson, RequestError } from './request-json';
import { uploadAddress, uploadFile } from './upload-file';

export interface Upload {
  /** `checking`: its hash is being made; `waiting`: the connection is lost, and it goes on by itself. */
  state: 'checking' | 'sending' | 'waiting' | 'sent' | 'failed';
  sentBytes: number;
  error: string | null;
}

export interface WantedUpload {
  path: string;
  file: File;
  url: string;
}

/** Requests that carry bytes, of all files together; a browser has six connections to a server. */
const LANES = 4;
/** Files that are hashed and asked about together, before any of them is sent. */
const GROUP_FILES = 100;
const GROUP_BYTES = 256 * 1024 * 1024;
/** Progress of many files is drawn together, or the page would do nothing else. */
const DRAW_MS = 150;

/** Wanted files in groups of few files and bytes; a large one is a group of its own. */
function* groupsOf(wanted: readonly WantedUpload[]): Iterable<WantedUpload[]> {
  let group: WantedUpload[] = [];
  let bytes = 0;
  for (const one of wanted) {
    if (group.length > 0 && (group.length === GROUP_FILES || bytes + one.file.size > GROUP_BYTES)) {
      yield group;
      [group, bytes] = [[], 0];
    }
    group.push(one);
    bytes += one.file.size;
  }
  if (group.length > 0) yield group;
}

/** Sends files side by side and in parts, and knows how far each is. What has arrived, now or at an earlier try, is not sent again. */
export function useImportUploads() {
  const [uploads, setUploads] = useState<ReadonlyMap<string, Upload>>(new Map());
  const now = useRef(new Map<string, Upload>());
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const controller = useRef<AbortController | null>(null);
  /** Addresses of uploads whose parts are kept, by path. */
  const begun = useRef(new Map<string, string>());

  const note = useCallback((path: string, upload: Upload | null) => {
    if (upload) now.current.set(path, upload);
    else now.current.delete(path);
    timer.current ??= setTimeout(() => {
      timer.current = null;
      setUploads(new Map(now.current));
    }, DRAW_MS);
  }, []);

  /** Runs one step of a file; false, with the reason noted, when it failed. */
  const attempt = useCallback(
    async <Answer>(path: string, signal: AbortSignal, act: () => Promise<Answer>): Promise<Answer | null> => {
      try {
        return await act();
      } catch (error) {
        const message = error instanceof RequestError ? error.message : 'This file could not be sent.';
        note(path, signal.aborted ? null : { state: 'failed', sentBytes: 0, error: message });
        return null;
      }
    },
    [note],
  );

  const sendOne = useCallback(
    async ({ path, file, url }: WantedUpload, hashes: FileHashes, lanes: RequestLanes, signal: AbortSignal): Promise<boolean> => {
      let sentBytes = 0;
      let waiting = 0;
      const tell = () => note(path, { state: waiting > 0 ? 'waiting' : 'sending', sentBytes, error: null });
      const sent = await attempt(path, signal, async () => {
        await uploadFile({
          address: uploadAddress(url),
          file,
          hashes,
          partBytes: DEFAULT_PART_BYTES,
          lanes,
          signal,
          onProgress: (bytes) => {
            sentBytes = bytes;
            tell();
          },
          onBegun: (address) => begun.current.set(path, address),
          onWaiting: (isWaiting) => {
            waiting = isWaiting ? 1 : 0;
            tell();
          },
        });
        begun.current.delete(path);
        note(path, { state: 'sent', sentBytes: file.size, error: null });
        return true;
      });
      return sent === true;
    },
    [attempt, note],
  );

  /** Hashes a group and asks which of it is there already; answers those whose bytes are needed, and whether all could be read. */
  const prepare = useCallback(
    async (group: readonly WantedUpload[], signal: AbortSignal) => {
      const hashed: { one: WantedUpload; hashes: FileHashes }[] = [];
      for (const one of group) {
        if (signal.aborted) break;
        note(one.path, { state: 'checking', sentBytes: 0, error: null });
        const hashes = await attempt(one.path, signal, () =>
          hashFile(one.file, DEFAULT_PART_BYTES, () => undefined).catch(() => {
            throw new RequestError(0, 'unreadable', 'The browser cannot read this file any more. Was it moved or changed?');
          }),
        );
        if (hashes) hashed.push({ one, hashes });
      }
      if (hashed.length === 0) return { needed: [], areAllRead: group.length === 0 };
      const items = hashed.map(({ one, hashes }) => ({ ...uploadAddress(one.url).said, bytes: one.file.size, sha256: hashes.sha256 }));
      const onWaiting = (isWaiting: boolean) => hashed.forEach(({ one }) => note(one.path, { state: isWaiting ? 'waiting' : 'checking', sentBytes: 0, error: null }));
      const ask = () => requestJson<KnownFilesAnswer>(`${uploadAddress(hashed[0].one.url).base}/known`, { method: 'POST', body: { items }, signal });
      // Whoever is refused here is refused when he sends, with the reason beside the file that it concerns.
      const known = await patiently(ask, { signal, onWaiting }).catch(() => null);
      const needed = hashed.filter((_, index) => known?.items[index].state !== 'stored');
      for (const { one } of hashed) note(one.path, needed.some((each) => each.one === one) ? { state: 'sending', sentBytes: 0, error: null } : { state: 'sent', sentBytes: one.file.size, error: null });
      return { needed, areAllRead: hashed.length === group.length };
    },
    [attempt, note],
  );

  /** Whether everything is there in the end. */
  const sendAll = useCallback(
    async (wanted: readonly WantedUpload[]): Promise<boolean> => {
      const { signal } = (controller.current = new AbortController());
      const lanes = new RequestLanes(LANES);
      const sending: Promise<boolean>[] = [];
      let areAllRead = true;
      for (const group of groupsOf(wanted.filter(({ path }) => now.current.get(path)?.state !== 'sent'))) {
        if (signal.aborted) break;
        const prepared = await prepare(group, signal);
        areAllRead &&= prepared.areAllRead;
        // The next group is hashed while this one goes up.
        sending.push(...prepared.needed.map(({ one, hashes }) => sendOne(one, hashes, lanes, signal)));
      }
      const arrived = await Promise.all(sending);
      return areAllRead && arrived.every(Boolean) && !signal.aborted;
    },
    [prepare, sendOne],
  );

  useEffect(
    () => () => {
      controller.current?.abort();
      if (timer.current !== null) clearTimeout(timer.current);
    },
    [],
  );

  /** Ends what is under way and removes the parts that arrived; what cannot be removed now runs out by itself. */
  const giveUpUploads = useCallback(async () => {
    controller.current?.abort();
    await Promise.allSettled([...begun.current.values()].map((address) => requestJson(address, { method: 'DELETE' })));
    begun.current.clear();
    now.current.clear();
    setUploads(new Map());
  }, []);

  return { uploads, sendAll, halt: () => controller.current?.abort(), giveUpUploads };
}
