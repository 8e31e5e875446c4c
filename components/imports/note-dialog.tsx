'use client';

import { useQuery } from '@tanstack/react-query';
import { Copy } from 'lucide-react';
import { useState } from 'react';
import { toast } from 'sonner';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Skeleton } from '@/components/ui/skeleton';
import { TextArea } from '@/components/ui/text-area';
import { requestJson } from '@/hooks/request-json';
import { noteToModelling } from '@/lib/rules/import-note';
import type { ReportRow } from '@/lib/rules/import-report';

/** What failed and what has problems, as plain text to copy, grouped by what mends it. Read when it is opened. */
export function NoteDialog({ show, path, address }: { show: string; path: string; address: string }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Note to modelling</Button>
      <Dialog open={open} onOpenChange={setOpen} title="Note to modelling" description="What failed and what has problems, grouped by what mends it." className="sm:w-[48rem]">
        {open ? <Note show={show} path={path} address={address} onCopied={() => setOpen(false)} /> : null}
      </Dialog>
    </>
  );
}

function Note({ show, path, address, onCopied }: { show: string; path: string; address: string; onCopied: () => void }) {
  const report = useQuery({
    queryKey: ['import-report', path],
    queryFn: ({ signal }) => requestJson<{ items: ReportRow[] }>(`${path}/report.json?level=warning`, { signal }),
    staleTime: 0,
    gcTime: 0,
  });
  if (report.isError) {
    return (
      <div className="flex flex-col items-start gap-3 text-14" role="alert">
        <p>The report could not be read. {report.error.message}</p>
        <Button onClick={() => void report.refetch()}>Try again</Button>
      </div>
    );
  }
  if (report.data === undefined) {
    return (
      <div role="status" aria-label="The note is being made" className="flex h-80 flex-col gap-3 pt-2">
        {['w-3/5', 'w-4/5', 'w-2/5', 'w-2/3'].map((width) => (
          <Skeleton key={width} className={width} />
        ))}
      </div>
    );
  }
  const note = noteToModelling(show, report.data.items, address);
  if (note === '') return <p className="text-14 text-ink-2">Nothing is wrong any more.</p>;
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(note);
      toast('The note is copied.');
      onCopied();
    } catch {
      toast.error('The browser does not allow copying here. Select the text instead.');
    }
  };
  return (
    <div className="flex flex-col gap-3">
      <TextArea aria-label="Note" readOnly rows={18} value={note} className="font-mono text-13" />
      <div>
        <Button look="filled" onClick={() => void copy()}>
          <Copy aria-hidden />
          Copy
        </Button>
      </div>
    </div>
  );
}
