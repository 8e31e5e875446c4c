'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { useApprovalActs, type ActRefusal } from '@/hooks/use-approval-acts';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import { withoutWarnings, type QueueRow } from '@/lib/rules/approval-queue';
import { compareHref } from '@/lib/rules/compare-href';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { WordsDialog, type WordsWish } from './words-dialog';
import { noteWish, questionWish } from './words-wishes';

interface AssetApprovalProps {
  frame: ShowFrame;
  asset: string;
  /** The asset's parts that have a value. */
  rows: readonly QueueRow[];
  actions: ApprovalActions;
}

/** How an asset's values stand, and what the reader may do about all of them at once. */
export function AssetApproval({ frame, asset, rows, actions }: AssetApprovalProps) {
  const router = useRouter();
  const acts = useApprovalActs(frame.code, actions);
  const [wish, setWish] = useState<WordsWish | null>(null);
  const [refusal, setRefusal] = useState<ActRefusal>(null);
  const waiting = rows.filter((row) => row.value_id === null);
  const clean = withoutWarnings(waiting);
  const unasked = waiting.filter((row) => row.request === null);

  async function done(send: () => Promise<ActRefusal>): Promise<ActRefusal> {
    const refused = await send();
    setRefusal(refused);
    if (refused === null) router.refresh();
    return refused;
  }

  return (
    <div className="flex flex-col gap-2 text-13">
      <p className="text-14">
        {stateWords(rows)}{' '}
        <Link href={compareHref(frame.code, { asset })} className="link ml-2 text-13">
          Compare
        </Link>
      </p>
      {waiting.length > clean.length && frame.may_approve ? <p className="text-ink-2">{heldWords(waiting)}</p> : null}
      <FormRefusal>{refusal?.message ?? null}</FormRefusal>
      <div className="flex flex-wrap gap-2">
        {frame.may_approve && clean.length > 0 ? (
          <>
            <Button size="small" disabled={acts.busy} onClick={() => void done(() => acts.approve(clean, ''))}>
              Approve {clean.length.toLocaleString('en')} without warnings
            </Button>
            <Button
              size="small"
              look="quiet"
              onClick={() => setWish(noteWish(clean, (note) => done(() => acts.approve(clean, note))))}
            >
              With a note
            </Button>
          </>
        ) : null}
        {frame.may_ask && !frame.may_approve && unasked.length > 0 ? (
          <Button
            size="small"
            disabled={acts.busy}
            onClick={() =>
              setWish(
                questionWish(
                  unasked.length === 1 ? `${asset} ${unasked[0].part}` : `${unasked.length} values of ${asset}`,
                  (note) => done(() => acts.ask(unasked, note)),
                ),
              )
            }
          >
            Ask for approval of {unasked.length.toLocaleString('en')}
          </Button>
        ) : null}
      </div>
      <WordsDialog wish={wish} onClose={() => setWish(null)} />
    </div>
  );
}

function stateWords(rows: readonly QueueRow[]): string {
  if (rows.length === 0) return 'No value to approve yet.';
  const count = (keep: (row: QueueRow) => boolean) => rows.filter(keep).length;
  const parts = [
    [count((row) => row.state === 'approved'), 'approved'],
    [count((row) => row.state === 'measured'), 'never approved'],
    [count((row) => row.state === 'outdated'), 'out of date'],
    [count((row) => row.request !== null), 'asked for'],
  ] as const;
  return parts.flatMap(([number, word]) => (number === 0 ? [] : [`${number.toLocaleString('en')} ${word}`])).join(', ');
}

function heldWords(waiting: readonly QueueRow[]): string {
  const own = waiting.filter((row) => row.own).length;
  const warned = waiting.filter((row) => !row.own && row.warnings.length > 0).length;
  const parts = [
    own > 0 ? `${own.toLocaleString('en')} you set yourself` : '',
    warned > 0 ? `${warned.toLocaleString('en')} with warnings` : '',
  ].filter(Boolean);
  return `Not among them: ${parts.join(', ')}.`;
}
