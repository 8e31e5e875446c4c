'use client';

import { Copy, RotateCcw } from 'lucide-react';
import Link from 'next/link';
import { parseAsStringLiteral, useQueryState } from 'nuqs';
import { useMemo, useState } from 'react';
import { toast } from 'sonner';
import { PageHeading } from '@/components/shell/page-heading';
import { Button } from '@/components/ui/button';
import { Chip } from '@/components/ui/chip';
import { Dialog } from '@/components/ui/dialog';
import { TextArea } from '@/components/ui/text-area';
import { requestJson, RequestError } from '@/hooks/request-json';
import { useImportLive } from '@/hooks/use-import-live';
import { LOUD_REMARKS, type ImportDetail, type ImportFileAnswer } from '@/lib/rules/import-answer';
import { noteToModelling } from '@/lib/rules/import-note';
import { planImport } from '@/lib/rules/import-plan';
import { ImportProgress } from './import-progress';
import { ReportTable } from './report-table';

interface ImportReportProps {
  show: string;
  upAxis: 'y' | 'z';
  initial: ImportDetail;
  /** Address of this page, for the note. */
  address: string;
  mayImport: boolean;
  /** The show's own pattern for names; null takes the built-in rule. */
  namePattern: string | null;
}

const FILTER_KEYS = ['all', 'failed', 'problems', 'look', 'going', 'unchanged'] as const;
type FilterKey = (typeof FILTER_KEYS)[number];

const HOLDS: Record<FilterKey, (file: ImportFileAnswer) => boolean> = {
  all: () => true,
  failed: (file) => file.state === 'failed',
  problems: (file) => (file.problems ?? 0) > 0,
  look: (file) => file.remarks.some((remark) => LOUD_REMARKS.includes(remark)),
  going: (file) => file.state === 'queued' || file.state === 'reading' || file.state === 'measuring',
  unchanged: (file) => file.remarks.includes('unchanged'),
};

const FILTER_WORDS: Record<FilterKey, string> = { all: 'All', failed: 'Failed', problems: 'With problems', look: 'Worth a look', going: 'Not ended', unchanged: 'Unchanged' };

/** What needs somebody first: failures, then problems, then what deserves a look. */
function urgency(file: ImportFileAnswer): number {
  return HOLDS.failed(file) ? 0 : HOLDS.problems(file) ? 1 : HOLDS.look(file) ? 2 : 3;
}

/** One import as it goes on and as it ended. Can be left and found again: all of it is on the server. */
export function ImportReport({ show, upAxis, initial, address, mayImport, namePattern }: ImportReportProps) {
  const { detail, restart, isLate } = useImportLive(show, initial);
  const [filter, setFilter] = useQueryState('show', parseAsStringLiteral(FILTER_KEYS).withDefault('all'));
  const [busy, setBusy] = useState(false);
  const { files, counts, state } = detail;
  const planned = useMemo(() => new Map(planImport(initial.files.map(({ name, asset }) => ({ name, asset })), namePattern).map((plan) => [plan.name, plan])), [initial.files, namePattern]);
  const isOver = state === 'done' || state === 'cancelled';
  const sorted = isOver ? files.toSorted((a, b) => urgency(a) - urgency(b) || (a.name < b.name ? -1 : 1)) : files;
  const note = noteToModelling(show, files, address);

  const act = async (verb: 'retry' | 'cancel' | 'submit') => {
    setBusy(true);
    try {
      await requestJson(`/api/v1/shows/${encodeURIComponent(show)}/imports/${detail.id}/${verb}`, { method: 'POST' });
      restart();
    } catch (error) {
      toast.error(error instanceof RequestError ? error.message : 'This did not work. Try again.');
    } finally {
      setBusy(false);
    }
  };

  const heading = (
    <>
      {note === '' ? null : <NoteDialog note={note} />}
      {mayImport && state === 'open' && counts.total > 0 ? (
        <Button look="filled" disabled={busy} onClick={() => void act('submit')}>
          Submit
        </Button>
      ) : null}
      {mayImport && !isOver ? (
        <Button disabled={busy} onClick={() => void act('cancel')}>
          Cancel the import
        </Button>
      ) : null}
      {mayImport && state === 'done' && counts.failed > 0 ? (
        <Button disabled={busy} onClick={() => void act('retry')}>
          <RotateCcw aria-hidden />
          Retry the failed ones
        </Button>
      ) : null}
      {state === 'done' && counts.done > 0 ? (
        <Button asChild look="filled">
          <Link href={`/shows/${show}`}>To the parts</Link>
        </Button>
      ) : null}
    </>
  );
  return (
    <>
      <PageHeading title={`Import of ${whenWords(detail.created_at)}`} measure={<ImportProgress counts={counts} state={state} />} actions={heading} />
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2 px-4 py-3 md:px-6">
        <div className="flex gap-2 overflow-x-auto" role="group" aria-label="Show files">
          {FILTER_KEYS.map((key) => ({ key, count: files.filter(HOLDS[key]).length }))
            .filter(({ key, count }) => key === 'all' || key === filter || count > 0)
            .map(({ key, count }) => (
              <Chip key={key} pressed={key === filter} count={count} onClick={() => void setFilter(key)}>
                {FILTER_WORDS[key]}
              </Chip>
            ))}
        </div>
        <p className="text-13 text-ink-3">
          {detail.created_by}
          {detail.turn_faces ? ' · Faces turned outwards' : ''}
          {detail.weld ? ' · Open borders welded' : ''}
          {isLate ? ' · The server does not answer; what is shown may be old.' : isOver ? '' : ' · This page can be left; the import goes on.'}
        </p>
      </div>
      <ReportTable show={show} upAxis={upAxis} planned={planned} files={sorted.filter(HOLDS[filter])} />
      <p role="status" aria-live="polite" className="sr-only">
        {isOver ? `The import is ${state}. ${counts.done} measured, ${counts.failed} failed.` : ''}
      </p>
    </>
  );
}

/** In UTC, so that server and browser say the same. */
function whenWords(iso: string): string {
  return `${new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', hour: '2-digit', minute: '2-digit', timeZone: 'UTC' }).format(new Date(iso))} UTC`;
}

function NoteDialog({ note }: { note: string }) {
  const [open, setOpen] = useState(false);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(note);
      toast('The note is copied.');
      setOpen(false);
    } catch {
      toast.error('The browser does not allow copying here. Select the text instead.');
    }
  };
  return (
    <>
      <Button onClick={() => setOpen(true)}>Note to modelling</Button>
      <Dialog open={open} onOpenChange={setOpen} title="Note to modelling" description="What failed and what has problems, as plain text." className="sm:w-[44rem]">
        <div className="flex flex-col gap-3">
          <TextArea aria-label="Note" readOnly rows={14} value={note} className="font-mono text-13" />
          <div>
            <Button look="filled" onClick={() => void copy()}>
              <Copy aria-hidden />
              Copy
            </Button>
          </div>
        </div>
      </Dialog>
    </>
  );
}
