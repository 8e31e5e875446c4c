'use client';

import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useRef, useState } from 'react';
import { mergeParts } from '@/lib/rules/merge-parts';
import { partKey } from '@/lib/rules/part-key';
import type { AssetTotal, PartCounts, PartRow } from '@/lib/rules/part-row';
import type { ItemError } from '@/lib/rules/studio-error';
import { itemFor, restoring, type ValueChange } from '@/lib/rules/value-change';
import { RequestError, requestJson } from './request-json';
import { partsKey, partsPath, type PartsData } from './use-parts';

/** A change of one row: the row as it was seen, and what is to be set. */
export interface RowChange {
  row: PartRow;
  change: ValueChange;
}

/** Rows that somebody else changed meanwhile, with what was to be set on them. Nothing of the call was done. */
export interface Conflict {
  changes: readonly RowChange[];
  moved: readonly { mine: RowChange; current: PartRow }[];
}

export type Outcome =
  | { kind: 'saved'; rows: number; act: number | null }
  | { kind: 'conflict'; conflict: Conflict }
  | { kind: 'refused'; message: string; errors: readonly ItemError[] }
  | { kind: 'nothing' };

interface PatchAnswer {
  items?: PartRow[];
  assets?: AssetTotal[];
  counts?: PartCounts;
}

/** An act that can be taken back. */
interface Act {
  id: number;
  inverse: RowChange[];
}

/** How many acts can be taken back one after another. */
const UNDO_DEPTH = 50;

/** Saves values of many rows in one call that does all or nothing, and takes them back. */
export function useSetValues(show: string) {
  const client = useQueryClient();
  const [saving, setSaving] = useState<ReadonlySet<string>>(new Set());
  const acts = useRef<Act[]>([]);
  const lastId = useRef(0);
  /** Revisions that our own saves made: an act is taken back over our own later change, never over another's. */
  const own = useRef(new Map<string, number>());

  const take = useCallback(
    (answer: PatchAnswer) => {
      if (answer.items !== undefined) {
        const newer = { ...answer, items: answer.items };
        client.setQueryData<PartsData>(
          partsKey(show),
          (data) => data && { ...data, pages: mergeParts(data.pages, newer) },
        );
      }
      if (answer.items === undefined || answer.assets === undefined) {
        void client.invalidateQueries({ queryKey: partsKey(show) });
      }
    },
    [client, show],
  );

  const save = useCallback(
    async (changes: readonly RowChange[]): Promise<Outcome> => {
      if (changes.length === 0) return { kind: 'nothing' };
      const keys = changes.map(({ row }) => partKey(row));
      setSaving((now) => new Set([...now, ...keys]));
      try {
        const items = changes.map(({ row, change }) => itemFor(row, change));
        const answer = await requestJson<PatchAnswer>(partsPath(show), { method: 'PATCH', body: { items } });
        for (const row of answer.items ?? []) own.current.set(partKey(row), row.revision);
        take(answer);
        void client.invalidateQueries({ queryKey: ['part', show] });
        return { kind: 'saved', rows: changes.length, act: null };
      } catch (error) {
        return outcomeOf(error, changes);
      } finally {
        setSaving((now) => new Set([...now].filter((key) => !keys.includes(key))));
      }
    },
    [client, show, take],
  );

  const send = useCallback(
    async (changes: readonly RowChange[]): Promise<Outcome> => {
      const outcome = await save(changes);
      if (outcome.kind !== 'saved') return outcome;
      lastId.current += 1;
      const inverse = changes.map(({ row }) => ({ row, change: restoring(row) }));
      acts.current = [...acts.current.slice(1 - UNDO_DEPTH), { id: lastId.current, inverse }];
      return { ...outcome, act: lastId.current };
    },
    [save],
  );

  /** Takes back one act of this page, the last one if none is named. */
  const undo = useCallback(
    async (id?: number): Promise<Outcome> => {
      const act = id === undefined ? acts.current.at(-1) : acts.current.find((one) => one.id === id);
      if (act === undefined) return { kind: 'nothing' };
      const changes = act.inverse.map(({ row, change }) => ({
        row: { ...row, revision: own.current.get(partKey(row)) ?? row.revision },
        change,
      }));
      const outcome = await save(changes);
      if (outcome.kind === 'saved') acts.current = acts.current.filter((one) => one !== act);
      return outcome;
    },
    [save],
  );

  /** Shows another's newer values without setting anything. */
  const takeTheirs = useCallback((rows: readonly PartRow[]) => take({ items: [...rows] }), [take]);

  return { send, undo, takeTheirs, saving };
}

function isRow(value: unknown): value is PartRow {
  return typeof value === 'object' && value !== null && 'revision' in value && 'asset' in value;
}

/** Reads a refusal of the server into what the screen can offer. */
export function outcomeOf(error: unknown, changes: readonly RowChange[]): Outcome {
  if (!(error instanceof RequestError)) throw error;
  const moved = error.errors.flatMap((item) => {
    const mine = changes[item.index];
    return mine !== undefined && isRow(item.current) ? [{ mine, current: item.current }] : [];
  });
  if (error.isConflict && moved.length > 0) return { kind: 'conflict', conflict: { changes, moved } };
  return { kind: 'refused', message: error.errors[0]?.message ?? error.message, errors: error.errors };
}
