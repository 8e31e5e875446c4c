'use client';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { Conflict, RowChange } from '@/hooks/use-set-values';
import { partKey, rowName } from '@/lib/rules/part-key';
import { setByWords, sourceSentence } from '@/lib/rules/source-words';
import type { LinearUnit } from '@/lib/rules/units';
import { changeWords } from './change-words';

interface ConflictDialogProps {
  unit: LinearUnit;
  conflict: Conflict | null;
  onKeepTheirs: (conflict: Conflict) => void;
  onSetMine: (changes: RowChange[]) => void;
  onClose: () => void;
}

/** Somebody else was quicker: what the rows hold now beside what was typed, which is kept until one of the two is chosen. */
export function ConflictDialog({ unit, conflict, onKeepTheirs, onSetMine, onClose }: ConflictDialogProps) {
  if (conflict === null) return null;
  const newer = new Map(conflict.moved.map(({ current }) => [partKey(current), current]));
  const mine = () =>
    onSetMine(conflict.changes.map(({ row, change }) => ({ row: newer.get(partKey(row)) ?? row, change })));
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="Changed meanwhile"
      description="Nothing was set. These rows were changed after you last saw them."
      className="sm:w-[44rem]"
    >
      <Table>
        <thead>
          <tr>
            <TableHead>Part</TableHead>
            <TableHead>Now</TableHead>
            <TableHead>Yours</TableHead>
          </tr>
        </thead>
        <tbody>
          {conflict.moved.map(({ mine: { change }, current }) => (
            <TableRow key={partKey(current)}>
              <TableCell className="align-top">
                {current.asset} {rowName(current)}
              </TableCell>
              <TableCell className="py-1 whitespace-normal">
                {sourceSentence(current)}
                <span className="block text-13 text-ink-3">{setByWords(current)}</span>
              </TableCell>
              <TableCell className="align-top whitespace-normal">{changeWords(change, unit)}</TableCell>
            </TableRow>
          ))}
        </tbody>
      </Table>
      <div className="mt-5 flex justify-end gap-2">
        <Button onClick={() => onKeepTheirs(conflict)}>Keep theirs</Button>
        <Button look="filled" onClick={mine}>
          Set mine over it
        </Button>
      </div>
    </Dialog>
  );
}
