'use client';

import { ArrowRight } from 'lucide-react';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Select } from '@/components/ui/select';
import type { RenameItem } from '@/hooks/use-part-renames';
import { whyNotRenamed, type AbsentPart, type ArrivedPart, type AssetRenames, type RenameDecision } from '@/lib/rules/part-rename';
import { carriesWords, fitWords } from './rename-words';

interface AssetRenameListProps {
  renames: AssetRenames;
  mayDecide: boolean;
  busy: boolean;
  onDecide: (items: readonly RenameItem[]) => void;
}

/** The parts of one asset in question: those that geometry proposes, then the others, to be matched by hand. */
export function AssetRenameList({ renames, mayDecide, busy, onDecide }: AssetRenameListProps) {
  const { asset, version, proposals, absent, arrived, kept_apart: keptApart } = renames;
  const item = (part: string, becomes: string, decision: RenameDecision): RenameItem => ({ asset, version, part, becomes, decision, kept_apart: keptApart.some((pair) => pair.part === part && pair.becomes === becomes) });
  const absentOf = new Map(absent.map((part) => [part.part, part]));
  const arrivedOf = new Map(arrived.map((part) => [part.part, part]));
  const proposed = new Set(proposals.flatMap(({ part, becomes }) => [part, becomes]));
  const free = arrived.filter((part) => !proposed.has(part.part));
  const clear = proposals.filter(({ becomes, others, fit }) => fit === 'place' && others === 0 && whyNotRenamed(arrivedOf.get(becomes)!) === null);
  const left = absent.filter((part) => !proposed.has(part.part));
  return (
    <section aria-label={asset}>
      <div className="flex flex-wrap items-baseline justify-between gap-2 border-b border-rule pb-1.5">
        <h3 className="text-14 font-medium">
          {asset} <span className="font-mono text-13 font-normal text-ink-2">{version}</span>
        </h3>
        {mayDecide && clear.length > 1 ? (
          <Button size="small" disabled={busy} onClick={() => onDecide(clear.map(({ part, becomes }) => item(part, becomes, 'confirmed')))}>
            Same part, all {clear.length} in place
          </Button>
        ) : null}
      </div>
      <ul>
        {proposals.map((proposal) => {
          const { part, becomes } = proposal;
          const why = whyNotRenamed(arrivedOf.get(becomes)!);
          return (
            <li key={part} className="flex flex-wrap items-center gap-x-4 gap-y-1.5 border-b border-rule py-2">
              <div className="min-w-0 flex-1 basis-64">
                <p className="flex min-w-0 flex-wrap items-center gap-x-2 font-mono text-13">
                  <span className="break-all text-ink-2">{part}</span>
                  <ArrowRight aria-label="becomes" className="size-3.5 shrink-0 text-ink-3" />
                  <span className="break-all">{becomes}</span>
                </p>
                <p className="text-12 text-ink-2">
                  {fitWords(proposal)}, {carriesWords(absentOf.get(part)!)}
                  {arrivedOf.get(becomes)!.has_setting && why === null ? `; what is set on ${becomes} gives way` : ''}
                </p>
                {why === null ? null : <p className="text-12 text-ink">{`${becomes} has values of its own. ${why}`}</p>}
              </div>
              {mayDecide ? (
                <div className="flex gap-2">
                  <Button size="small" disabled={busy || why !== null} aria-label={`${part} and ${becomes} are the same part`} onClick={() => onDecide([item(part, becomes, 'confirmed')])}>
                    Same part
                  </Button>
                  <Button size="small" look="quiet" disabled={busy} aria-label={`${part} and ${becomes} are two parts`} onClick={() => onDecide([item(part, becomes, 'refused')])}>
                    Two parts
                  </Button>
                </div>
              ) : null}
            </li>
          );
        })}
        {left.map((part) => (
          <ByHand key={part.part} part={part} free={free} busy={busy} mayDecide={mayDecide} onConfirm={(becomes) => onDecide([item(part.part, becomes, 'confirmed')])} />
        ))}
      </ul>
    </section>
  );
}

interface ByHandProps {
  part: AbsentPart;
  free: readonly ArrivedPart[];
  busy: boolean;
  mayDecide: boolean;
  onConfirm: (becomes: string) => void;
}

/** A part that the version lacks and that nothing fits: somebody may say which one it is now. */
function ByHand({ part, free, busy, mayDecide, onConfirm }: ByHandProps) {
  const [becomes, setBecomes] = useState('');
  const options = free.map((one) => ({ value: one.part, label: one.part, detail: whyNotRenamed(one) === null ? undefined : 'has values of its own' }));
  const chosen = free.find((one) => one.part === becomes);
  const why = chosen ? whyNotRenamed(chosen) : null;
  return (
    <li className="flex flex-wrap items-center gap-x-4 gap-y-1.5 border-b border-rule py-2">
      <div className="min-w-0 flex-1 basis-56">
        <p className="font-mono text-13 break-all text-ink-2">{part.part}</p>
        <p className="text-12 text-ink-2">
          not since {part.last_version}, {carriesWords(part)}
        </p>
        {why === null ? null : <p className="text-12 text-ink">{why}</p>}
      </div>
      {mayDecide && free.length > 0 ? (
        <div className="flex items-center gap-2">
          <Select aria-label={`${part.part} is now`} placeholder="Is now…" className="w-48" options={options} value={becomes} disabled={busy} onValueChange={setBecomes} />
          <Button size="small" disabled={busy || becomes === '' || why !== null} aria-label={`${part.part} is the same part`} onClick={() => onConfirm(becomes)}>
            Same part
          </Button>
        </div>
      ) : null}
    </li>
  );
}
