'use client';

import { useState, type ReactNode } from 'react';
import { useApprovalActs, type AskedRow } from '@/hooks/use-approval-acts';
import type { ApprovalActions } from '@/lib/rules/approval-actions';
import { rowName } from '@/lib/rules/part-key';
import type { PartRow } from '@/lib/rules/part-row';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { WordsDialog, type WordsWish } from './words-dialog';
import { questionWish } from './words-wishes';

/** Rows of the parts table whose approval can be asked for: they have a value, and it is not approved. */
export function askableRows(rows: readonly PartRow[]): AskedRow[] {
  return rows.flatMap((row) =>
    row.value_sha256 === null || row.value_id !== null
      ? []
      : [{ asset: row.asset, part: rowName(row), row: row.row, shot: null, value_sha256: row.value_sha256 }],
  );
}

/** Asking for the approval of rows, with its dialog. */
export function useQuestion(
  frame: ShowFrame,
  actions: ApprovalActions,
): { open: (rows: readonly AskedRow[]) => void; dialog: ReactNode } {
  const acts = useApprovalActs(frame.code, actions);
  const [wish, setWish] = useState<WordsWish | null>(null);
  return {
    open: (rows) =>
      setWish(
        questionWish(
          rows.length === 1 ? `${rows[0].asset} ${rows[0].part}` : `${rows.length.toLocaleString('en')} values`,
          (note) => acts.ask(rows, note),
        ),
      ),
    dialog: <WordsDialog wish={wish} onClose={() => setWish(null)} />,
  };
}
