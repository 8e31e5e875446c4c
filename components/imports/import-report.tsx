'use client';

import { useEffect, useRef, useState } from 'react';
import { PartRenames } from '@/components/renames/part-renames';
import { PageHeading } from '@/components/shell/page-heading';
import { Button } from '@/components/ui/button';
import { useImportFiles, type FileQuery } from '@/hooks/use-import-files';
import { useImportFilters } from '@/hooks/use-import-filters';
import { useImportLive } from '@/hooks/use-import-live';
import { useOnline } from '@/hooks/use-online';
import type { ImportFilePage, ImportSummary } from '@/lib/rules/import-answer';
import { ImportActs } from './import-acts';
import { ImportAnnouncer } from './import-announcer';
import { ImportProgress } from './import-progress';
import { ImportStanding } from './import-standing';
import { ReportTable } from './report-table';
import { ReportToolbar } from './report-toolbar';

interface ImportReportProps {
  show: string;
  upAxis: 'y' | 'z';
  initial: ImportSummary;
  /** The first page of files, and what the address asked for when it was read. */
  first: { query: FileQuery; page: ImportFilePage };
  /** Address of this page, for the note. */
  address: string;
  mayImport: boolean;
}

/** One import as it goes on and as it ended. Can be left and found again: all of it is on the server. */
export function ImportReport({ show, upAxis, initial, first, address, mayImport }: ImportReportProps) {
  const { filters, setFilters } = useImportFilters();
  const files = useImportFiles(show, initial.id, filters, first);
  const { summary, trouble, restart } = useImportLive(show, initial, files.take);
  const isOnline = useOnline();
  const { total, failed, queued, reading, measuring } = summary.counts;
  const counts = { ...files.counts, all: total, failed, going: queued + reading + measuring };
  const isOver = summary.state === 'done' || summary.state === 'cancelled';
  const { refresh } = files;
  const wasOver = useRef(isOver);
  useEffect(() => {
    if (isOver !== wasOver.current) void refresh();
    wasOver.current = isOver;
  }, [isOver, refresh]);
  const [opened, setOpened] = useState<ReadonlySet<string>>(new Set());
  const toggle = (name: string) =>
    setOpened((now) => {
      const next = new Set(now);
      if (!next.delete(name)) next.add(name);
      return next;
    });
  const isEmpty = files.rows.length === 0;
  return (
    <>
      <PageHeading
        title={`Import of ${whenWords(summary.created_at)}`}
        actions={
          <ImportActs
            show={show}
            summary={summary}
            address={address}
            mayImport={mayImport}
            hasWrong={counts.failed + counts.problems + counts.warnings > 0}
            onActed={() => {
              restart();
              void refresh();
            }}
          />
        }
      />
      <ImportProgress summary={summary} />
      <PartRenames show={show} scope={{ import: initial.id }} mayDecide={mayImport} waiting={summary.state !== 'done'} />
      <ReportToolbar filters={filters} onChange={(change) => void setFilters(change)} counts={counts} found={files.found} />
      <ImportStanding show={show} summary={summary} trouble={isOnline ? trouble : 'offline'} />
      {files.isError && isEmpty ? (
        <div role="alert" className="flex flex-col items-start gap-3 px-4 py-10 text-14 md:px-6">
          <p>The files could not be read. {files.error.message}</p>
          <Button onClick={() => void files.refetch()}>Try again</Button>
        </div>
      ) : isEmpty && !files.isFetching ? (
        <NothingHere isEmptyImport={summary.counts.total === 0} state={summary.state} onAll={() => void setFilters({ only: null, q: null })} />
      ) : (
        <ReportTable
          show={show}
          upAxis={upAxis}
          rows={files.rows}
          found={files.found}
          sort={filters.sort}
          onSort={(sort) => void setFilters({ sort })}
          opened={opened}
          onToggle={toggle}
          isReading={files.isFetchingNextPage || files.isPlaceholderData}
          onEnd={() => {
            if (files.hasNextPage && !files.isFetchingNextPage) void files.fetchNextPage();
          }}
        />
      )}
      <ImportAnnouncer summary={summary} />
    </>
  );
}

function NothingHere({ isEmptyImport, state, onAll }: { isEmptyImport: boolean; state: ImportSummary['state']; onAll: () => void }) {
  if (isEmptyImport) {
    return <p className="px-4 py-10 text-14 text-ink-2 md:px-6">{state === 'open' ? 'No file has arrived yet. They show here as they come.' : 'No file was put into this import.'}</p>;
  }
  return (
    <div className="flex flex-col items-start gap-3 px-4 py-10 text-14 md:px-6">
      <p className="text-ink-2">No file of this import is like that.</p>
      <Button onClick={onAll}>Show all files</Button>
    </div>
  );
}

/** In UTC, so that server and browser say the same. */
function whenWords(iso: string): string {
  return `${new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', hour: '2-digit', minute: '2-digit', timeZone: 'UTC' }).format(new Date(iso))} UTC`;
}
