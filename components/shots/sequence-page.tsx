'use client';

import Link from 'next/link';
import { useState } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { LockReport } from '@/components/locks/lock-report';
import { OutdatedLocks } from '@/components/locks/outdated-locks';
import { Button } from '@/components/ui/button';
import { useAct } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { LockShotsInput, RelockValuesInput } from '@/lib/rules/inputs/lock-values';
import type { LockShotsAnswer } from '@/lib/rules/lock-answers';
import type { SequenceDetail, ShotActs } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';
import type { LinearUnit } from '@/lib/rules/units';
import { SequenceMatrix } from './sequence-matrix';
import { shotsHref } from './shot-hrefs';
import { ShotMark } from './shot-mark';

interface SequencePageProps {
  show: string;
  unit: LinearUnit;
  acts: ShotActs;
  sequence: SequenceDetail;
  lockShots: (input: LockShotsInput) => Promise<ActionResult<LockShotsAnswer>>;
  relock: (input: RelockValuesInput) => Promise<ActionResult<{ items: unknown[] }>>;
}

/** A sequence: its shots against the assets in them, locked as a whole and pulled shot by shot. */
export function SequencePage({ show, unit, acts, sequence, lockShots, relock }: SequencePageProps) {
  const [report, setReport] = useState<LockShotsAnswer | null>(null);
  const { act, busy, refusal } = useAct(lockShots);
  return (
    <>
      <header className="flex flex-wrap items-center gap-x-6 gap-y-3 border-b border-rule px-4 py-4 md:px-6">
        <div>
          <p className="text-13 text-ink-2">
            <Link href={shotsHref(show)} className="link">
              Shots
            </Link>{' '}
            · {counted(sequence.shots.length, 'shot')}
          </p>
          <h1>{sequence.sequence}</h1>
        </div>
        <p className="flex flex-wrap items-baseline gap-x-3">
          <ShotMark of={sequence} className="text-16 font-medium [&_svg]:size-4" />
          <span className="text-13 text-ink-3">{sequence.locked.toLocaleString('en')} locked</span>
        </p>
        {acts.may_lock && sequence.missing > 0 ? (
          <Button
            look="filled"
            className="ml-auto"
            disabled={busy}
            onClick={() => {
              setReport(null);
              void act({ show, shots: [], sequence: sequence.sequence }, setReport);
            }}
          >
            {busy ? 'Locking' : 'Lock sequence'}
          </Button>
        ) : null}
      </header>
      <LockReport show={show} answer={report} onClose={() => setReport(null)} />
      {refusal === null ? null : (
        <div className="border-b border-rule px-4 py-2.5 md:px-6">
          <ActRefusal refusal={refusal} />
        </div>
      )}
      <SequenceMatrix show={show} sequence={sequence} />
      {sequence.outdated_locks.length === 0 ? null : (
        <section aria-labelledby="outdated-heading" className="mt-8 border-t border-rule">
          <h2 id="outdated-heading" className="px-4 pt-4 md:px-6">
            Out of date
          </h2>
          <OutdatedLocks show={show} unit={unit} locks={sequence.outdated_locks} mayLock={acts.may_lock} primary={sequence.missing === 0} relock={relock} />
        </section>
      )}
    </>
  );
}
