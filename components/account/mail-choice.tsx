'use client';

import { useOptimistic, useTransition } from 'react';
import { toast } from 'sonner';
import { Choice } from '@/components/ui/choice';
import type { ActionResult } from '@/lib/rules/action-result';
import { MAIL_CHOICE_WORDS, MAIL_CHOICES, type MailChoice as Value } from '@/lib/rules/mail-choices';

const OPTIONS = MAIL_CHOICES.map((value) => ({ value, label: MAIL_CHOICE_WORDS[value].replace(/^./, (first) => first.toUpperCase()) }));

interface MailChoiceProps {
  choice: Value;
  /** Hour of UTC at which digests go out. */
  digestHour: number;
  send: (input: { choice: Value }) => Promise<ActionResult<unknown>>;
}

/** How its reader is told of what happens. */
export function MailChoice({ choice, digestHour, send }: MailChoiceProps) {
  const [shown, show] = useOptimistic(choice);
  const [busy, start] = useTransition();
  const choose = (next: Value) =>
    start(async () => {
      show(next);
      const result = await send({ choice: next }).catch(() => null);
      if (!result?.ok) toast.error(result?.message ?? 'The server was not reached. Try again.');
    });
  return (
    <div className="flex flex-col gap-3">
      <Choice label="Mail" value={shown} options={OPTIONS} onChange={choose} disabled={busy} />
      <p className="max-w-[60ch] text-13 text-ink-3">
        You are told when values that you took are unlocked or re-locked, when what you asked for is approved, and when a new version moves what you follow.
        {shown === 'daily' ? ` One mail a day, at ${String(digestHour).padStart(2, '0')}:00 UTC, if there is anything.` : ''}
      </p>
    </div>
  );
}
