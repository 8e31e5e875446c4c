'use client';

import { Plus } from 'lucide-react';
import { useState } from 'react';
import { toast } from 'sonner';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Tabs } from '@/components/ui/tabs';
import { useAct } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import type { ListedShot } from '@/lib/rules/parse-shot-list';
import type { ShotPlan } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';
import { ShotForm } from './shot-form';
import { ShotList } from './shot-list';

interface AddShotsProps {
  show: string;
  /** Codes of the show's assets. */
  assets: readonly string[];
  primary: boolean;
  plan: (input: PutShotsInput) => Promise<ActionResult<ShotPlan>>;
  put: (input: PutShotsInput) => Promise<ActionResult<{ items: unknown[] }>>;
}

/** Adds shots one by one, by paste, or from a CSV file; the same list may come again with more in it. */
export function AddShots({ show, assets, primary, plan, put }: AddShotsProps) {
  const [open, setOpen] = useState(false);
  const { act, busy, refusal, forget } = useAct(put);

  function add(shots: readonly (Pick<ListedShot, 'code' | 'sequence' | 'assets'> & { title?: string })[]) {
    const items = shots.map(({ code, sequence, title, assets: inside }) => ({ code, sequence, assets: inside, ...(title ? { title } : {}) }));
    void act({ show, items }, () => {
      setOpen(false);
      toast(items.length === 1 ? `${items[0].code} is in the list` : `${counted(items.length, 'shot')} are in the list`);
    });
  }

  return (
    <>
      <Button look={primary ? 'filled' : 'outline'} onClick={() => setOpen(true)}>
        <Plus aria-hidden />
        Add shots
      </Button>
      <Dialog
        open={open}
        onOpenChange={(next) => {
          setOpen(next);
          forget();
        }}
        title="Add shots"
        className="sm:w-[min(52rem,calc(100vw-4rem))]"
      >
        <Tabs
          label="How to add shots"
          tabs={[
            { value: 'list', label: 'Paste or CSV file', content: <ShotList show={show} plan={plan} busy={busy} refusal={refusal} onAdd={add} /> },
            { value: 'one', label: 'One shot', content: <ShotForm assets={assets} busy={busy} refusal={refusal} onAdd={add} /> },
          ]}
        />
      </Dialog>
    </>
  );
}
