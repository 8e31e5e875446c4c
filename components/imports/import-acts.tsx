'use client';

import { Download, Pause, Play, RotateCcw } from 'lucide-react';
import Link from 'next/link';
import { useState } from 'react';
import { toast } from 'sonner';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Menu, MenuItem, MenuNote } from '@/components/ui/menu';
import { requestJson, RequestError } from '@/hooks/request-json';
import type { ImportAnswer } from '@/lib/rules/import-answer';
import { NoteDialog } from './note-dialog';

interface ImportActsProps {
  show: string;
  summary: ImportAnswer;
  /** Address of the page, for the note. */
  address: string;
  mayImport: boolean;
  /** Whether anything is there that a note could say. */
  hasWrong: boolean;
  onActed: () => void;
}

type ImportVerb = 'retry' | 'cancel' | 'submit' | 'pause' | 'resume';

/** What can be done with an import, by its state. */
export function ImportActs({ show, summary, address, mayImport, hasWrong, onActed }: ImportActsProps) {
  const [busy, setBusy] = useState(false);
  const [cancelling, setCancelling] = useState(false);
  const { state, paused, counts, id } = summary;
  const path = `/api/v1/shows/${encodeURIComponent(show)}/imports/${id}`;
  const isGoing = state === 'queued' || state === 'running';
  const act = async (verb: ImportVerb) => {
    setBusy(true);
    try {
      await requestJson(`${path}/${verb}`, { method: 'POST' });
      onActed();
    } catch (error) {
      toast.error(error instanceof RequestError ? error.message : 'This did not work. Try again.');
    } finally {
      setBusy(false);
    }
  };
  return (
    <>
      {counts.total === 0 ? null : (
        <Menu
          trigger={
            <Button>
              <Download aria-hidden />
              Report
            </Button>
          }
        >
          <MenuItem asChild>
            <a href={`${path}/report.csv?guard=1`} download>
              CSV, for a spreadsheet
            </a>
          </MenuItem>
          <MenuItem asChild>
            <a href={`${path}/report.json`} download>
              JSON
            </a>
          </MenuItem>
          <MenuNote>Files and findings, no values: it leaves no receipt.</MenuNote>
        </Menu>
      )}
      {hasWrong ? <NoteDialog show={show} path={path} address={address} /> : null}
      {mayImport && isGoing ? (
        <Button disabled={busy} onClick={() => void act(paused ? 'resume' : 'pause')} look={paused ? 'filled' : 'outline'}>
          {paused ? <Play aria-hidden /> : <Pause aria-hidden />}
          {paused ? 'Resume' : 'Pause'}
        </Button>
      ) : null}
      {mayImport && (isGoing || state === 'open') ? (
        <Button disabled={busy} onClick={() => setCancelling(true)}>
          Cancel the import
        </Button>
      ) : null}
      {mayImport && state === 'open' && counts.total > 0 ? (
        <Button look="filled" disabled={busy} onClick={() => void act('submit')}>
          Submit
        </Button>
      ) : null}
      {mayImport && state !== 'open' && state !== 'cancelled' && counts.failed > 0 ? (
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
      <Dialog open={cancelling} onOpenChange={setCancelling} title="Cancel the import" description="What was measured stays. What was not is left out, and earlier versions, values and locks are as they were.">
        <div className="flex justify-end gap-2">
          <Button onClick={() => setCancelling(false)}>Go on</Button>
          <Button
            look="wrong"
            disabled={busy}
            onClick={() => {
              setCancelling(false);
              void act('cancel');
            }}
          >
            Cancel the import
          </Button>
        </div>
      </Dialog>
    </>
  );
}
