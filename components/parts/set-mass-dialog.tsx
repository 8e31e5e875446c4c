'use client';

import { Dialog } from '@/components/ui/dialog';
import type { RowChange } from '@/hooks/use-set-values';
import { rowName } from '@/lib/rules/part-key';
import type { PartRow } from '@/lib/rules/part-row';
import type { MaterialOption, ShowFrame } from '@/lib/rules/show-frame';
import { ValueForm } from './value-form';

interface SetMassDialogProps {
  rows: readonly PartRow[] | null;
  frame: ShowFrame;
  materials: readonly MaterialOption[];
  busy: boolean;
  onSet: (changes: RowChange[]) => void;
  onClose: () => void;
}

/** The form of values over the rows that were chosen when it opened. */
export function SetMassDialog({ rows, frame, materials, busy, onSet, onClose }: SetMassDialogProps) {
  if (rows === null || rows.length === 0) return null;
  const assets = new Set(rows.map((row) => row.asset));
  const title = rows.length === 1 ? `Set ${rowName(rows[0])}` : `Set ${rows.length.toLocaleString('en')} parts`;
  const where = assets.size === 1 ? `of ${rows[0].asset}` : `of ${assets.size.toLocaleString('en')} assets`;
  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={title} description={where}>
      <ValueForm rows={rows} frame={frame} materials={materials} busy={busy} onSet={onSet} />
    </Dialog>
  );
}
