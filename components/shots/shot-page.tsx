'use client';

import Link from 'next/link';
import { useState, type ReactNode } from 'react';
import { LockReport } from '@/components/locks/lock-report';
import { RelockDialog } from '@/components/locks/relock-dialog';
import { UnlockDialog } from '@/components/locks/unlock-dialog';
import { Section } from '@/components/parts/facts';
import { ActRefusal } from '@/components/forms/act-refusal';
import { DropOverrideDialog } from '@/components/overrides/drop-override-dialog';
import { OverrideDialog } from '@/components/overrides/override-dialog';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { useShotActs, type ShotActions } from '@/hooks/use-shot-acts';
import type { ShotActs, ShotDetail } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { SlotBar } from './slot-bar';
import { SlotTable } from './slot-table';
import { ShotAssets } from './shot-assets';
import { sequenceHref, shotCsvHref, shotHref, shotJsonHref, shotsHref } from './shot-hrefs';
import { ShotMark } from './shot-mark';
import { ShotPulls } from './shot-pulls';
import { ShotSince } from './shot-since';
import { slotKey } from '@/lib/rules/shot-slots';

interface ShotPageProps {
  frame: ShowFrame;
  acts: ShotActs;
  shot: ShotDetail;
  /** Codes of the show's assets. */
  assets: readonly string[];
  actions: ShotActions;
  /** Whether its reader is told of the shot, and who is. */
  tellMe: ReactNode;
}

/** A shot: its verdict, what is locked to what, who took it, and what changed since its reader took it. */
export function ShotPage({ frame, acts, shot, assets, actions, tellMe }: ShotPageProps) {
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const act = useShotActs(frame.code, shot, actions, () => setChosen(new Set()));
  const picked = shot.slots.filter((slot) => chosen.has(slotKey(slot)));
  const overrides = shot.slots.filter((slot) => slot.override !== null).length;
  const choose = (keys: readonly string[], on: boolean) =>
    setChosen((now) => (on ? new Set([...now, ...keys]) : new Set([...now].filter((key) => !keys.includes(key)))));

  return (
    <>
      <header className="flex flex-wrap items-center gap-x-6 gap-y-3 border-b border-rule px-4 py-4 md:px-6">
        <div className="min-w-0">
          <p className="text-13 text-ink-2">
            <Link href={shotsHref(frame.code)} className="link">
              Shots
            </Link>{' '}
            ·{' '}
            <Link href={sequenceHref(frame.code, shot.sequence)} className="link">
              {shot.sequence}
            </Link>
            {shot.title === null ? null : ` · ${shot.title}`} ·{' '}
            <Link href={`${shotHref(frame.code, shot.code)}/history`} className="link">
              History
            </Link>
          </p>
          <h1 className="break-words">{shot.code}</h1>
        </div>
        <p className="flex flex-wrap items-baseline gap-x-3">
          <ShotMark of={shot} className="text-16 font-medium [&_svg]:size-4" />
          <span className="text-13 text-ink-3">{shot.locked.toLocaleString('en')} locked</span>
          {overrides === 0 ? null : <span className="border-l-2 border-brass pl-1.5 text-13 text-ink-2">{counted(overrides, 'override')}</span>}
        </p>
        <div className="ml-auto flex flex-wrap items-center gap-2">
          {shot.locked === 0 ? null : (
            <>
              <Button asChild look="quiet">
                <a href={shotJsonHref(frame.code, shot.code)} download>
                  JSON
                </a>
              </Button>
              <Button asChild look={acts.may_lock && shot.missing > 0 ? 'outline' : 'filled'}>
                <a href={shotCsvHref(frame.code, shot.code)} download onClick={act.afterDownload}>
                  Download CSV
                </a>
              </Button>
            </>
          )}
          {acts.may_lock && shot.missing > 0 ? (
            <Button look="filled" disabled={act.busy} onClick={act.lockShot}>
              {act.busy ? 'Locking' : 'Lock shot'}
            </Button>
          ) : null}
        </div>
      </header>
      <LockReport show={frame.code} answer={act.report} onClose={act.closeReport} />
      {act.asking === null && act.refusal !== null ? (
        <div className="border-b border-rule px-4 py-2.5 md:px-6">
          <ActRefusal refusal={act.refusal} />
        </div>
      ) : null}
      <div className="grid lg:min-h-0 lg:flex-1 lg:grid-cols-[minmax(0,1fr)_21rem]">
        <div className="flex min-w-0 flex-col lg:min-h-0 lg:overflow-y-auto">
          {shot.slots.length === 0 ? (
            <EmptyState title="Nothing in this shot yet">{acts.may_edit ? 'Add the assets that are in it; then lock what is approved.' : 'A lead or a character TD adds the assets.'}</EmptyState>
          ) : (
            <>
              {picked.length === 0 ? null : <SlotBar slots={picked} busy={act.busy} onLock={act.lock} onUnlock={act.askUnlock} onRelock={act.askRelock} onClear={() => setChosen(new Set())} />}
              <SlotTable
                show={frame.code}
                slots={shot.slots}
                chosen={chosen}
                onChoose={choose}
                selectable={acts.may_lock}
                acts={acts}
                onLock={(slot) => act.lock([slot])}
                onUnlock={(slot) => act.askUnlock([slot])}
                onRelock={(slot) => act.askRelock([slot])}
                onOverride={act.askOverride}
                onDrop={act.askDrop}
              />
            </>
          )}
        </div>
        <aside aria-label="Downloads and assets" tabIndex={0} className="border-rule bg-bench pb-6 max-lg:border-t lg:overflow-y-auto lg:border-l [&>section:first-child]:border-t-0">
          <ShotSince since={shot.since} />
          <ShotPulls pulls={shot.pulls} />
          <ShotAssets show={frame.code} shot={shot} assets={assets} mayEdit={acts.may_edit} put={actions.put} remove={actions.remove} />
          <Section title="Mail">{tellMe}</Section>
        </aside>
      </div>
      <UnlockDialog slots={act.asking?.kind === 'unlock' ? act.asking.slots : null} key={act.dialogKey('unlock')} shot={shot.code} busy={act.busy} refusal={act.refusal} onUnlock={act.unlock} onClose={act.stopAsking} />
      <RelockDialog locks={act.asking?.kind === 'relock' ? act.asking.locks : null} key={act.dialogKey('relock')} unit={frame.linear_unit} busy={act.busy} refusal={act.refusal} onRelock={act.relock} onClose={act.stopAsking} />
      <OverrideDialog slot={act.asking?.kind === 'override' ? act.asking.slot : null} key={act.dialogKey('override')} frame={frame} busy={act.busy} refusal={act.refusal} onDraft={act.draft} onClose={act.stopAsking} />
      <DropOverrideDialog slot={act.asking?.kind === 'drop' ? act.asking.slot : null} key={act.dialogKey('drop')} busy={act.busy} refusal={act.refusal} onDrop={act.drop} onClose={act.stopAsking} />
    </>
  );
}
