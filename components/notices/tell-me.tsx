'use client';

import { useId } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { Checkbox } from '@/components/ui/checkbox';
import { useAct } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { ToldAnswer } from '@/lib/rules/told';

interface TellMeProps {
  show: string;
  /** A shot or an asset of the show; neither for the show itself. */
  shot?: string;
  asset?: string;
  answer: ToldAnswer;
  send: (input: { show: string; shot?: string; asset?: string; told: boolean }) => Promise<ActionResult<unknown>>;
}

/** Whether its reader is told of a show, a shot or an asset, and who else is. */
export function TellMe({ show, shot, asset, answer, send }: TellMeProps) {
  const id = useId();
  const { act, busy, refusal } = useAct(send);
  const what = shot !== undefined ? 'this shot' : asset !== undefined ? 'this asset' : 'this show';
  const isWhole = shot === undefined && asset === undefined;
  return (
    <div className="flex flex-col gap-1 text-13">
      <div className="flex items-center gap-2.5">
        <Checkbox id={id} checked={answer.told} disabled={busy} onCheckedChange={(checked) => void act({ show, shot, asset, told: checked === true }, () => undefined)} />
        <label htmlFor={id} className="text-14 text-ink">
          Tell me what happens to {what}
        </label>
      </div>
      {answer.told_of_show && !isWhole ? <p className="text-ink-3">You are told of the whole show.</p> : null}
      <p className="text-ink-2">
        <span className="text-ink-3">People told: </span>
        {answer.people.length === 0 ? 'nobody' : answer.people.map((person) => person.name).join(', ')}
      </p>
      <ActRefusal refusal={refusal} />
    </div>
  );
}
