'use client';

import Link from 'next/link';
import { useState } from 'react';
import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { Moment } from '@/components/ui/moment';
import { approvalOf, useApprovalActs, type ActRefusal } from '@/hooks/use-approval-acts';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import { verdictSentence, whyNotApprovable, type QueueRow } from '@/lib/rules/approval-queue';
import { compareHref } from '@/lib/rules/compare-href';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { AskedShape } from './queue-cells';
import { ToleranceMark } from './tolerance-mark';
import { WordsDialog, type WordsWish } from './words-dialog';
import { noteWish, questionWish, takeBackWish } from './words-wishes';

interface PartApprovalProps {
  frame: ShowFrame;
  row: QueueRow;
  actions: ApprovalActions;
}

/** How a part's value stands to its last approval, and what the reader may do about it. */
export function PartApproval({ frame, row, actions }: PartApprovalProps) {
  const acts = useApprovalActs(frame.code, actions);
  const [wish, setWish] = useState<WordsWish | null>(null);
  const [refusal, setRefusal] = useState<ActRefusal>(null);
  const why = whyNotApprovable(row);
  const atOnce = async (send: () => Promise<ActRefusal>) => setRefusal(await send());
  return (
    <div className="flex flex-col gap-2 text-13">
      <p className="flex flex-wrap gap-x-3 text-14">
        {verdictSentence(row)}
        {row.beyond_tolerance === null ? null : <ToleranceMark beyond={row.beyond_tolerance} />}
      </p>
      {row.last === null ? null : (
        <p className="text-ink-2">
          {row.last.version}, approved by {row.last.approved_by}, <Moment at={row.last.approved_at} />
          {row.last.note === null ? '. ' : `: “${row.last.note}” `}
          {row.value_id !== null ? null : (
            <Link href={compareHref(frame.code, { asset: row.asset, part: row.part })} className="link">
              Compare
            </Link>
          )}
        </p>
      )}
      {row.request === null ? null : (
        <p className="flex items-start gap-1.5">
          <span className="mt-0.5">
            <AskedShape />
          </span>
          <span>
            {row.request.own ? 'You ask' : `${row.request.asked_by} asks`} for its approval,{' '}
            <Moment at={row.request.asked_at} />
            {row.request.note === null ? '.' : `: “${row.request.note}”`}
          </span>
        </p>
      )}
      {frame.may_approve && row.own ? <p className="text-ink-2">{why}</p> : null}
      <FormRefusal>{refusal?.message ?? null}</FormRefusal>
      <div className="flex flex-wrap gap-2">
        {frame.may_approve && why === null ? (
          <>
            <Button size="small" disabled={acts.busy} onClick={() => void atOnce(() => acts.approve([row], ''))}>
              Approve
            </Button>
            <Button
              size="small"
              look="quiet"
              onClick={() => setWish(noteWish([row], (note) => acts.approve([row], note)))}
            >
              With a note
            </Button>
          </>
        ) : null}
        {frame.may_ask && row.value_id === null && (!frame.may_approve || row.own || row.request?.own) ? (
          <AskAct
            row={row}
            busy={acts.busy}
            onTakeBack={() => void atOnce(() => acts.takeQuestionBack([row]))}
            onAsk={() => setWish(questionWish(`${row.asset} ${row.part}`, (note) => acts.ask([row], note)))}
          />
        ) : null}
        {frame.may_approve && approvalOf(row) !== null ? (
          <Button
            size="small"
            look="quiet"
            onClick={() => setWish(takeBackWish([row], (reason) => acts.takeBack([row], reason)))}
          >
            Take back
          </Button>
        ) : null}
      </div>
      <WordsDialog wish={wish} onClose={() => setWish(null)} />
    </div>
  );
}

function AskAct({
  row,
  busy,
  onAsk,
  onTakeBack,
}: {
  row: QueueRow;
  busy: boolean;
  onAsk: () => void;
  onTakeBack: () => void;
}) {
  return row.request?.own ? (
    <Button size="small" disabled={busy} onClick={onTakeBack}>
      Take question back
    </Button>
  ) : (
    <Button size="small" disabled={busy} onClick={onAsk}>
      Ask for approval
    </Button>
  );
}
