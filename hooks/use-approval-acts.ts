'use client';

import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { toast } from 'sonner';
import type { ActionResult } from '@/lib/rules/action-result';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import { approvalItem, queueKey, type CarryOverRow, type QueueRow } from '@/lib/rules/approval-queue';
import type { PartRow } from '@/lib/rules/part-row';
import type { ItemError } from '@/lib/rules/studio-error';
import { queuesKey, type QueueData } from './use-queue';

/** Why a value was refused, with its row as it is where it changed meanwhile. */
export interface Refusal {
  message: string;
  current: PartRow | null;
}

/** Why nothing was done; `placed` where the values concerned say it themselves. Null when it was done. */
export type ActRefusal = { message: string; placed: boolean } | null;

const NONE: ReadonlyMap<string, Refusal> = new Map();
const values = (count: number) => `${count.toLocaleString('en')} values`;

/** Approves, takes back, asks and carries over; says what was done, and keeps at each value why it was refused. */
export function useApprovalActs(show: string, actions: ApprovalActions) {
  const client = useQueryClient();
  const [refusals, setRefusals] = useState<ReadonlyMap<string, Refusal>>(NONE);
  const [busy, setBusy] = useState(false);

  async function run(
    keys: readonly string[],
    send: () => Promise<ActionResult<unknown>>,
    done: string,
    leaves: readonly string[],
  ): Promise<ActRefusal> {
    setBusy(true);
    const result = await send().catch((): ActionResult<unknown> => unreached);
    setBusy(false);
    const refused = result.ok ? [] : refusalsOf(result.errors, keys);
    setRefusals((now) => new Map([...[...now].filter(([key]) => !keys.includes(key)), ...refused]));
    if (result.ok) {
      if (leaves.length > 0)
        client.setQueriesData<QueueData>(
          { queryKey: queuesKey(show) },
          (data) => data && withoutKeys(data, new Set(leaves)),
        );
      toast(done);
    }
    // What was refused has most often changed meanwhile, so that what stands here is read again either way.
    void client.invalidateQueries({ queryKey: queuesKey(show) });
    void client.invalidateQueries({ queryKey: ['part', show] });
    void client.invalidateQueries({ queryKey: ['parts', show] });
    return result.ok ? null : { message: result.message, placed: refused.length > 0 };
  }

  const named = (rows: readonly Pick<QueueRow, 'asset' | 'part'>[], what: (count: number) => string) =>
    rows.length === 1 ? `${rows[0].asset} ${rows[0].part}` : what(rows.length);

  return {
    busy,
    refusals,
    forget: () => setRefusals(NONE),
    approve: (rows: readonly QueueRow[], note: string) => {
      const keys = rows.map(queueKey);
      return run(
        keys,
        () => actions.approve({ show, items: rows.map(approvalItem), note }),
        `Approved ${named(rows, values)}`,
        keys,
      );
    },
    carryOver: (rows: readonly CarryOverRow[], note: string) => {
      const items = rows.map((row) => ({ ...row, shot: null }));
      const keys = items.map(queueKey);
      return run(
        keys,
        () => actions.approve({ show, items: items.map(approvalItem), note, carry_over: true }),
        `Carried over ${named(rows, values)}`,
        keys,
      );
    },
    takeBack: (rows: readonly QueueRow[], reason: string) => {
      const ids = rows.flatMap((row) => approvalOf(row) ?? []);
      const keys = rows.map(queueKey);
      const leaves = rows.filter((row) => row.value_id !== null).map(queueKey);
      return run(
        keys,
        () => actions.withdraw({ show, items: ids.map((value_id) => ({ value_id })), reason }),
        `Took the approval of ${named(rows, values)} back`,
        leaves,
      );
    },
    ask: (rows: readonly AskedRow[], note: string) => {
      return run(
        rows.map(queueKey),
        () => actions.ask({ show, items: rows.map(askItem), note }),
        `Asked for the approval of ${named(rows, values)}`,
        [],
      );
    },
    takeQuestionBack: (rows: readonly AskedRow[]) => {
      return run(
        rows.map(queueKey),
        () => actions.ask({ show, items: rows.map(askItem), take_back: true }),
        `Took the question about ${named(rows, values)} back`,
        [],
      );
    },
  };
}

/** A value that may be asked for; an override is not asked for, it waits by itself. */
export type AskedRow = Pick<QueueRow, 'asset' | 'part' | 'row' | 'shot' | 'value_sha256'>;

function askItem(row: AskedRow) {
  return approvalItem({ ...row, shot: null });
}

/** The approval that taking back concerns: of this very value, else the last one. */
export function approvalOf(row: Pick<QueueRow, 'value_id' | 'last'>): string | null {
  return row.value_id ?? row.last?.value_id ?? null;
}

function refusalsOf(errors: readonly ItemError[], keys: readonly string[]): [string, Refusal][] {
  return errors.flatMap((error): [string, Refusal][] => {
    const key = keys[error.index];
    return key === undefined
      ? []
      : [[key, { message: error.message, current: isRow(error.current) ? error.current : null }]];
  });
}

function isRow(value: unknown): value is PartRow {
  return typeof value === 'object' && value !== null && 'revision' in value;
}

/** Takes values out of a list that was read, and out of its counts, until it is read again. */
function withoutKeys(data: QueueData, keys: ReadonlySet<string>): QueueData {
  const gone = data.pages.flatMap((page) => page.items.filter((row) => keys.has(queueKey(row))));
  return {
    ...data,
    pages: data.pages.map((page) => ({
      ...page,
      items: page.items.filter((row) => !keys.has(queueKey(row))),
      counts: page.counts && lessened(page.counts, gone),
    })),
  };
}

function lessened(counts: NonNullable<QueueData['pages'][number]['counts']>, gone: readonly QueueRow[]) {
  const waited = gone.filter((row) => row.value_id === null);
  const approved = gone.length - waited.length;
  return {
    waiting: counts.waiting - waited.length + approved,
    asked: counts.asked - waited.filter((row) => row.request !== null).length,
    outdated: counts.outdated - waited.filter((row) => row.state === 'outdated').length,
    approved: counts.approved + waited.length - approved,
  };
}

const unreached: ActionResult<unknown> = {
  ok: false,
  code: 'not_reached',
  message: 'The server was not reached. Nothing was done; try again.',
  field: null,
  errors: [],
};
