'use client';

import Link from 'next/link';
import { useState } from 'react';
import { compareLockHref, shotHref } from '@/components/shots/shot-hrefs';
import { StateMark } from '@/components/states/state-mark';
import { Button } from '@/components/ui/button';
import { Checkbox } from '@/components/ui/checkbox';
import { ENGINEERING_WIDTHS, Figure } from '@/components/ui/figure';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { useAct } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { RelockValuesInput } from '@/lib/rules/inputs/lock-values';
import type { OutdatedLock } from '@/lib/rules/outdated-lock';
import { assetInShot, counted } from '@/lib/rules/shot-words';
import type { LinearUnit } from '@/lib/rules/units';
import { RelockDialog } from './relock-dialog';

interface OutdatedLocksProps {
  show: string;
  unit: LinearUnit;
  locks: readonly OutdatedLock[];
  mayLock: boolean;
  /** Re-locking is what the screen is there for. */
  primary: boolean;
  relock: (input: RelockValuesInput) => Promise<ActionResult<{ items: unknown[] }>>;
}

/** Locks whose part has another value by now, with the differences; those with an approved new value can be re-locked together. */
export function OutdatedLocks({ show, unit, locks, mayLock, primary, relock }: OutdatedLocksProps) {
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const [asking, setAsking] = useState<readonly OutdatedLock[] | null>(null);
  const [done, setDone] = useState<string | null>(null);
  const { act, busy, refusal, forget } = useAct(relock);
  const ready = locks.filter((lock) => lock.current?.value_id);
  const picked = ready.filter((lock) => chosen.has(lock.lock));
  const toggle = (ids: readonly string[], on: boolean) =>
    setChosen((now) => (on ? new Set([...now, ...ids]) : new Set([...now].filter((id) => !ids.includes(id)))));
  const isNew = (index: number) => index === 0 || locks[index - 1].shot !== locks[index].shot;

  return (
    <>
      <div className="flex min-h-12 flex-wrap items-center gap-x-4 gap-y-2 border-b border-rule px-4 py-2 md:px-6">
        <p role="status" className="text-14 text-ink-2">
          {done ?? `${counted(locks.length, 'lock')} out of date, ${ready.length === 0 ? 'none' : ready.length.toLocaleString('en')} with an approved new value.`}
        </p>
        {mayLock && ready.length > 0 ? (
          <Button look={primary ? 'filled' : 'outline'} size="small" className="ml-auto" onClick={() => setAsking(picked.length > 0 ? picked : ready)}>
            Re-lock {(picked.length > 0 ? picked : ready).length.toLocaleString('en')}…
          </Button>
        ) : null}
      </div>
      <Table>
        <thead>
          <tr>
            {mayLock ? (
              <TableHead className="w-8 pr-0 pl-4 md:pl-6">
                <Checkbox
                  aria-label="Every lock with an approved new value"
                  disabled={ready.length === 0}
                  checked={ready.length > 0 && picked.length === ready.length ? true : picked.length > 0 ? 'indeterminate' : false}
                  onCheckedChange={(on) => toggle(ready.map((lock) => lock.lock), on === true)}
                />
              </TableHead>
            ) : null}
            <TableHead className={mayLock ? undefined : 'pl-4 md:pl-6'}>Shot</TableHead>
            <TableHead>Asset and part</TableHead>
            <TableHead>Difference</TableHead>
            <TableHead>
              <span className="sr-only">Compare</span>
            </TableHead>
            <TableHead>Locked to</TableHead>
            <TableHead className="pr-11 text-right">Locked, kg</TableHead>
            <TableHead>Now</TableHead>
            <TableHead className="pr-11 text-right">Now, kg</TableHead>
            <TableHead className="w-full pr-4 md:pr-6">New value</TableHead>
          </tr>
        </thead>
        <tbody>
          {locks.map((lock, index) => (
            <TableRow key={lock.lock} className={chosen.has(lock.lock) ? 'bg-selected' : undefined}>
              {mayLock ? (
                <TableCell className="pr-0 pl-4 md:pl-6">
                  <Checkbox
                    aria-label={`${lock.shot} ${assetInShot(lock.asset, lock.copy)} ${lock.part ?? lock.body ?? ''}`}
                    disabled={!lock.current?.value_id}
                    checked={chosen.has(lock.lock)}
                    onCheckedChange={(on) => toggle([lock.lock], on === true)}
                  />
                </TableCell>
              ) : null}
              <TableCell className={mayLock ? undefined : 'pl-4 md:pl-6'}>
                <Link href={shotHref(show, lock.shot)} className={isNew(index) ? 'link' : 'link text-ink-3'}>
                  {lock.shot}
                </Link>
              </TableCell>
              <TableCell>
                <span className="text-ink-2">{assetInShot(lock.asset, lock.copy)}</span> {lock.part ?? lock.body}
              </TableCell>
              <TableCell>
                <span className={lock.beyond_tolerance ? 'font-medium' : 'text-ink-2'}>{lock.verdict}</span>
                {lock.beyond_tolerance ? null : <span className="ml-2 text-13 text-ink-3">within tolerance</span>}
              </TableCell>
              <TableCell>
                <Link href={compareLockHref(show, lock.lock)} className="link text-13">
                  Compare<span className="sr-only"> {lock.shot} {lock.asset} {lock.part ?? lock.body}</span>
                </Link>
              </TableCell>
              <TableCell className="font-mono text-13 text-ink-2">{lock.locked.version}</TableCell>
              <TableCell className="text-right">
                <Figure value={lock.locked.mass_kg} notation="engineering" align={ENGINEERING_WIDTHS} />
              </TableCell>
              <TableCell className="font-mono text-13 text-ink-2">{lock.current?.version ?? '–'}</TableCell>
              <TableCell className="text-right">
                <Figure value={lock.current?.mass_kg ?? null} notation="engineering" align={ENGINEERING_WIDTHS} />
              </TableCell>
              <TableCell className="pr-4 md:pr-6">
                <NewValue lock={lock} />
              </TableCell>
            </TableRow>
          ))}
        </tbody>
      </Table>
      <RelockDialog
        key={asking?.map((lock) => lock.lock).join(' ')}
        locks={asking}
        unit={unit}
        busy={busy}
        refusal={refusal}
        onRelock={(items, reason) =>
          void act({ show, items, reason }, () => {
            setAsking(null);
            setChosen(new Set());
            setDone(`${counted(items.length, 'part')} re-locked.`);
          })
        }
        onClose={() => {
          setAsking(null);
          forget();
        }}
      />
    </>
  );
}

/** Whether there is anything to re-lock to. */
function NewValue({ lock: { state, current } }: { lock: OutdatedLock }) {
  if (current?.value_id) return <StateMark state="approved" />;
  if (state === null) return <span className="text-13 text-ink-2">not in the current version</span>;
  if (state === 'measured' || state === 'outdated') return <span className="text-13 text-ink-2">not approved yet</span>;
  return <StateMark state={state} />;
}
