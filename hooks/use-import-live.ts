'use client';

import { useEffect, useEffectEvent, useState } from 'react';
import type { ImportDetail, ImportFileAnswer, ImportSummary } from '@/lib/rules/import-answer';
import { importLink } from './import-link';
import { requestJson, RequestError } from './request-json';

const POLL_MS = 3_000;
/** The stream may break off and come back for so long before the page asks by itself. */
const PATIENCE_MS = 6_000;

/** Why what is shown may be old: no answer, no session any more, or no right to read it any more. */
export type LiveTrouble = 'late' | 'signed_out' | 'gone' | null;

const isOver = ({ state }: Pick<ImportSummary, 'state'>): boolean => state === 'done' || state === 'cancelled';

/**
 * An import as it goes on: by the one event stream that all tabs of the browser share, or by asking every few seconds where that does
 * not arrive. Both go on from the mark of what is known.
 * @param onFiles told the files that changed
 */
export function useImportLive(show: string, initial: ImportSummary, onFiles: (files: readonly ImportFileAnswer[]) => void): { summary: ImportSummary; trouble: LiveTrouble; restart: () => void } {
  const [summary, setSummary] = useState(initial);
  const [trouble, setTrouble] = useState<LiveTrouble>(null);
  const [run, setRun] = useState(0);
  const { id, mark: firstMark } = initial;
  const idle = run === 0 && isOver(initial);
  const onNews = useEffectEvent((news: ImportDetail) => {
    setTrouble(null);
    setSummary(news);
    if (news.files.length > 0) onFiles(news.files);
  });

  useEffect(() => {
    if (idle) return;
    let mark = firstMark;
    let isGone = false;
    let isPolling = false;
    let timer: ReturnType<typeof setTimeout> | null = null;
    const hear = (news: ImportDetail) => {
      mark = news.mark;
      onNews(news);
    };
    const poll = async () => {
      timer = null;
      isPolling = true;
      try {
        const news = await requestJson<ImportDetail>(`/api/v1/shows/${encodeURIComponent(show)}/imports/${id}?since=${mark}`);
        if (isGone) return;
        hear(news);
        if (isOver(news)) return;
      } catch (error) {
        if (isGone) return;
        const status = error instanceof RequestError ? error.status : 0;
        setTrouble(status === 401 ? 'signed_out' : status === 404 ? 'gone' : 'late');
        if (status === 404) return;
      }
      if (!isGone && isPolling) timer = setTimeout(() => void poll(), POLL_MS);
    };
    const stop = importLink().watch({ show, id, mark }, (news) => {
      if (news.kind === 'import') return hear(news.news);
      if (news.kind === 'gone') return setTrouble('gone');
      if (timer !== null) clearTimeout(timer);
      timer = null;
      isPolling = false;
      if (!news.isOpen) timer = setTimeout(() => void poll(), PATIENCE_MS);
    });
    return () => {
      isGone = true;
      stop();
      if (timer !== null) clearTimeout(timer);
    };
  }, [show, id, firstMark, run, idle]);

  // Somebody may have tried the failed files again from elsewhere.
  const isEnded = isOver(summary);
  useEffect(() => {
    if (!isEnded) return;
    const look = () => document.visibilityState === 'visible' && setRun((now) => now + 1);
    document.addEventListener('visibilitychange', look);
    return () => document.removeEventListener('visibilitychange', look);
  }, [isEnded]);

  return { summary, trouble, restart: () => setRun((now) => now + 1) };
}
