'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { RequestError } from './request-json';
import { uploadFile } from './upload-file';

export interface Upload {
  state: 'sending' | 'sent' | 'failed';
  sentBytes: number;
  error: string | null;
}

export interface WantedUpload {
  path: string;
  file: File;
  url: string;
}

const AT_ONCE = 4;
/** Progress of many files is drawn together, or the page would do nothing else. */
const DRAW_MS = 150;

/** Sends files four at a time and knows how far each is. What has arrived is not sent again. */
export function useImportUploads() {
  const [uploads, setUploads] = useState<ReadonlyMap<string, Upload>>(new Map());
  const now = useRef(new Map<string, Upload>());
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const controller = useRef<AbortController | null>(null);

  const note = useCallback((path: string, upload: Upload | null) => {
    if (upload) now.current.set(path, upload);
    else now.current.delete(path);
    timer.current ??= setTimeout(() => {
      timer.current = null;
      setUploads(new Map(now.current));
    }, DRAW_MS);
  }, []);

  const sendOne = useCallback(
    async ({ path, file, url }: WantedUpload, signal: AbortSignal): Promise<boolean> => {
      note(path, { state: 'sending', sentBytes: 0, error: null });
      try {
        await uploadFile({ url, file, signal, onProgress: (sentBytes) => note(path, { state: 'sending', sentBytes, error: null }) });
        note(path, { state: 'sent', sentBytes: file.size, error: null });
        return true;
      } catch (error) {
        const message = error instanceof RequestError ? error.message : 'This file could not be sent.';
        note(path, signal.aborted ? null : { state: 'failed', sentBytes: 0, error: message });
        return false;
      }
    },
    [note],
  );

  /** Whether everything is there in the end. */
  const sendAll = useCallback(
    async (wanted: readonly WantedUpload[]): Promise<boolean> => {
      const { signal } = (controller.current = new AbortController());
      const waiting = wanted.filter(({ path }) => now.current.get(path)?.state !== 'sent');
      let allArrived = true;
      const lane = async () => {
        for (let next = waiting.shift(); next && !signal.aborted; next = waiting.shift()) if (!(await sendOne(next, signal))) allArrived = false;
      };
      await Promise.all(Array.from({ length: AT_ONCE }, lane));
      return allArrived && !signal.aborted;
    },
    [sendOne],
  );

  useEffect(
    () => () => {
      controller.current?.abort();
      if (timer.current !== null) clearTimeout(timer.current);
    },
    [],
  );

  return { uploads, sendAll, halt: () => controller.current?.abort() };
}
