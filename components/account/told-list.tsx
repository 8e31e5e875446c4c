'use client';

import Link from 'next/link';
import { ActRefusal } from '@/components/forms/act-refusal';
import { Button } from '@/components/ui/button';
import { useAct } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { ToldPlace } from '@/lib/rules/told';

interface ToldListProps {
  places: readonly ToldPlace[];
  send: (input: { show: string; shot?: string; asset?: string; told: boolean }) => Promise<ActionResult<unknown>>;
}

/** What its reader asked to be told of. */
export function ToldList({ places, send }: ToldListProps) {
  const { act, busy, refusal } = useAct(send);
  if (places.length === 0) return <p className="max-w-[60ch] text-14 text-ink-2">Nothing yet. A show’s history, an asset and a shot each have a box to tick.</p>;
  return (
    <>
      <ul className="flex flex-col">
        {places.map(({ show, title, shot, asset }) => (
          <li key={`${show}/${shot ?? ''}/${asset ?? ''}`} className="flex min-h-10 flex-wrap items-center gap-x-3 border-b border-rule py-1 text-14">
            <Link href={hrefOf(show, shot, asset)} className="link min-w-0 break-words">
              {shot ?? asset ?? 'The whole show'}
            </Link>
            <span className="min-w-0 text-13 text-ink-2">{title}</span>
            <Button
              size="small"
              look="quiet"
              className="ml-auto"
              disabled={busy}
              aria-label={`No more mail about ${shot ?? asset ?? 'the whole show'}, ${title}`}
              onClick={() => void act({ show, shot: shot ?? undefined, asset: asset ?? undefined, told: false }, () => undefined)}
            >
              No more
            </Button>
          </li>
        ))}
      </ul>
      <ActRefusal refusal={refusal} />
    </>
  );
}

function hrefOf(show: string, shot: string | null, asset: string | null): string {
  const base = `/shows/${encodeURIComponent(show)}`;
  if (shot !== null) return `${base}/shots/${encodeURIComponent(shot)}`;
  return asset === null ? base : `${base}/assets/${encodeURIComponent(asset)}`;
}
