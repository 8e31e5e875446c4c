'use client';

import { useState } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { Button } from '@/components/ui/button';
import { useAct } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { LockShotsInput } from '@/lib/rules/inputs/lock-values';
import type { LockShotsAnswer } from '@/lib/rules/lock-answers';
import { LockReport } from './lock-report';

interface LockAssetProps {
  show: string;
  asset: string;
  lockShots: (input: LockShotsInput) => Promise<ActionResult<LockShotsAnswer>>;
}

/** Locks what is approved of an asset in every shot that has it. */
export function LockAsset({ show, asset, lockShots }: LockAssetProps) {
  const [report, setReport] = useState<LockShotsAnswer | null>(null);
  const { act, busy, refusal } = useAct(lockShots);
  return (
    <div className="flex flex-col items-start gap-2">
      <Button
        size="small"
        disabled={busy}
        onClick={() => {
          setReport(null);
          void act({ show, shots: [], asset }, setReport);
        }}
      >
        {busy ? 'Locking' : 'Lock what is approved in all its shots'}
      </Button>
      <ActRefusal refusal={refusal} />
      <LockReport show={show} answer={report} onClose={() => setReport(null)} />
    </div>
  );
}
