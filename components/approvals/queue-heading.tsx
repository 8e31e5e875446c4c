import { PageHeading } from '@/components/shell/page-heading';
import { Button } from '@/components/ui/button';
import type { QueueActs } from '@/hooks/answer-queue-key';
import { approvalOf } from '@/hooks/use-approval-acts';
import { whyNotApprovable, type QueueRow } from '@/lib/rules/approval-queue';
import type { ShowFrame } from '@/lib/rules/show-frame';

interface QueueHeadingProps {
  frame: ShowFrame;
  /** What an act would concern: what is chosen, else the active row. */
  targets: readonly QueueRow[];
  chosen: number;
  outdated: number;
  busy: boolean;
  acts: QueueActs;
}

/** What is done most, for the pointer; every act has its key too. */
export function QueueHeading({ frame, targets, chosen, outdated, busy, acts }: QueueHeadingProps) {
  const able = targets.filter((row) => whyNotApprovable(row) === null).length;
  const approved = targets.length > 0 && targets.every((row) => row.value_id !== null);
  const asks = targets.some((row) => row.request?.own);
  const several = chosen > 1 ? ` ${able.toLocaleString('en')}` : '';
  return (
    <PageHeading
      title="Approvals"
      actions={
        <>
          <Button look="quiet" className="max-sm:px-2" disabled={targets.length === 0} onClick={acts.compare}>
            Compare
          </Button>
          {frame.may_ask && !frame.may_approve ? (
            <Button
              look={asks ? 'outline' : 'filled'}
              disabled={busy || approved || targets.length === 0}
              onClick={acts.ask}
            >
              {asks
                ? 'Take question back'
                : `Ask for approval${chosen > 1 ? ` of ${chosen.toLocaleString('en')}` : ''}`}
            </Button>
          ) : null}
          {frame.may_approve ? (
            <>
              {outdated > 0 ? (
                <Button className="max-sm:px-2.5" onClick={acts.carryOver}>
                  Carry over
                </Button>
              ) : null}
              {approved ? (
                <Button disabled={busy || !targets.some((row) => approvalOf(row) !== null)} onClick={acts.takeBack}>
                  Take back{chosen > 1 ? ` ${chosen.toLocaleString('en')}` : ''}
                </Button>
              ) : (
                <>
                  <Button className="max-sm:px-2.5" disabled={busy || able === 0} onClick={acts.note}>
                    <span className="max-sm:sr-only">With a note</span>
                    <span aria-hidden className="sm:hidden">
                      Note
                    </span>
                  </Button>
                  <Button look="filled" disabled={busy || able === 0} onClick={acts.approve}>
                    Approve{several}
                  </Button>
                </>
              )}
            </>
          ) : null}
        </>
      }
    />
  );
}
