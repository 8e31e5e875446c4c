'use client';

import { useEffect, useState } from 'react';
import type { ImportDetail } from '@/lib/rules/import-answer';
import { requestJson } from './request-json';

const POLL_MS = 3_000;
/** Breaks in a row after which the stream is taken to be held up on the way, and the page asks instead. */
const MOST_BREAKS = 3;

const isOver = (detail: ImportDetail): boolean => detail.state === 'done' || detail.state === 'cancelled';

/** What came, over what was known: an event has only the files that changed. */
export function mergeImport(known: ImportDetail, came: ImportDetail): ImportDetail {
  const files = new Map(known.files.map((file) => [file.name, file]));
  for (const file of came.files) files.set(file.name, file);
  return { ...came, files: [...files.values()].sort((a, b) => (a.name < b.name ? -1 : 1)) };
}

/** An import as it goes on: by server-sent events, or by asking every few seconds where those do not arrive. */
export function useImportLive(
  show: string,
  initial: ImportDetail,
): { detail: ImportDetail; restart: () => void; isLate: boolean } {
  const [detail, setDetail] = useState(initial);
  const [run, setRun] = useState(0);
  const [isLate, setIsLate] = useState(false);
  const path = `/api/v1/shows/${encodeURIComponent(show)}/imports/${initial.id}`;
  const idle = run === 0 && isOver(initial);

  useEffect(() => {
    if (idle) return;
    let breaks = 0;
    let timer: ReturnType<typeof setTimeout> | null = null;
    let isGone = false;
    const source = new EventSource(`${path}/events`);
    const poll = async () => {
      try {
        const came = await requestJson<ImportDetail>(path);
        if (isGone) return;
        setDetail(came);
        setIsLate(false);
        if (isOver(came)) return;
      } catch {
        if (!isGone) setIsLate(true);
      }
      if (!isGone) timer = setTimeout(() => void poll(), POLL_MS);
    };
    source.addEventListener('import', (event) => {
      breaks = 0;
      setIsLate(false);
      const came = JSON.parse(String(event.data)) as ImportDetail;
      setDetail((known) => mergeImport(known, came));
      if (isOver(came)) source.close();
    });
    source.onerror = () => {
      breaks++;
      if (breaks < MOST_BREAKS && source.readyState !== EventSource.CLOSED) return;
      source.close();
      void poll();
    };
    return () => {
      isGone = true;
      source.close();
      if (timer !== null) clearTimeout(timer);
    };
  }, [path, run, idle]);

  return { detail, restart: () => setRun((now) => now + 1), isLate };
}
