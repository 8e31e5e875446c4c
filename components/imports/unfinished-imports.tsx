'use client';

import Link from 'next/link';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import type { OpenImport } from '@/lib/rules/import-answer';

const WHEN = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit', timeZone: 'UTC' });

interface UnfinishedImportsProps {
  show: string;
  imports: readonly OpenImport[];
  /** The one that the dropped files go on with. */
  continued: OpenImport | null;
  /** Files were dropped already. */
  areFilesHere: boolean;
  onDiscard: (id: string) => Promise<unknown>;
}

/** The reader's imports that were opened and never submitted: what a reload or a lost connection left behind. */
export function UnfinishedImports({ show, imports, continued, areFilesHere, onDiscard }: UnfinishedImportsProps) {
  const [busy, setBusy] = useState<string | null>(null);
  if (imports.length === 0) return null;
  const discard = async (id: string) => {
    setBusy(id);
    await onDiscard(id);
    setBusy(null);
  };
  return (
    <ul aria-label="Unfinished imports" className="flex flex-col border-y border-rule bg-bench">
      {imports.map((one) => (
        <li key={one.id} className="flex flex-wrap items-center gap-x-4 gap-y-1.5 border-b border-rule px-4 py-2 text-13 last:border-b-0 md:px-6">
          <p className="min-w-0 flex-1 basis-64 text-ink-2">
            <Link className="link" href={`/shows/${encodeURIComponent(show)}/imports/${one.id}`}>
              Import of {WHEN.format(new Date(one.created_at))} UTC
            </Link>{' '}
            was not submitted. {arrivedWords(one.names.length)} {nextWords(one === continued, areFilesHere)}
          </p>
          <Button size="small" disabled={busy !== null} aria-label={`Discard the import of ${WHEN.format(new Date(one.created_at))}`} onClick={() => void discard(one.id)}>
            Discard
          </Button>
        </li>
      ))}
    </ul>
  );
}

const arrivedWords = (count: number): string => (count === 0 ? 'No file arrived whole.' : count === 1 ? '1 file arrived.' : `${count.toLocaleString('en')} files arrived.`);

function nextWords(isContinued: boolean, areFilesHere: boolean): string {
  if (isContinued) return 'The files below go on with it.';
  return areFilesHere ? '' : 'Drop the same files to go on where it stopped.';
}
