'use client';

import Link from 'next/link';
import { Button } from '@/components/ui/button';
import type { PartRow } from '@/lib/rules/part-row';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { partHref } from './part-href';

interface PhoneActsProps {
  chosen: readonly PartRow[];
  frame: ShowFrame;
  onSet: () => void;
  /** Null where nothing chosen can be asked for. */
  onAsk: (() => void) | null;
  onLetGo: () => void;
}

/** What can be done with the chosen rows where there is no inspector beside the table. */
export function PhoneActs({ chosen, frame, onSet, onAsk, onLetGo }: PhoneActsProps) {
  if (chosen.length === 0) return null;
  return (
    <div className="flex items-center gap-2 border-t border-rule bg-raised px-4 py-2 lg:hidden">
      {frame.may_set ? (
        <Button onClick={onSet}>
          {chosen.length === 1 ? 'Set mass' : `Set ${chosen.length.toLocaleString('en')} parts`}
        </Button>
      ) : null}
      {onAsk === null ? null : <Button onClick={onAsk}>Ask</Button>}
      {chosen.length === 1 ? (
        <Button asChild>
          <Link href={partHref(frame.code, chosen[0])}>Open part</Link>
        </Button>
      ) : null}
      <Button look="quiet" className="ml-auto" onClick={onLetGo}>
        Let go
      </Button>
    </div>
  );
}
