'use client';

import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { requestJson } from '@/hooks/request-json';
import type { ActRefusal } from '@/hooks/use-approval-acts';
import type { CarryOverAnswer, CarryOverRow } from '@/lib/rules/approval-queue';

interface CarryOverDialogProps {
  show: string;
  onCarry: (rows: readonly CarryOverRow[]) => Promise<ActRefusal>;
  onClose: () => void;
}

/** All values that moved less than the show's tolerance, seen before their approvals are carried over in one act. */
export function CarryOverDialog({ show, onCarry, onClose }: CarryOverDialogProps) {
  const { data, error } = useQuery({
    queryKey: ['carry-over', show],
    queryFn: ({ signal }) =>
      requestJson<CarryOverAnswer>(`/api/v1/shows/${encodeURIComponent(show)}/carry-over`, { signal }),
    staleTime: 0,
  });
  const [refusal, setRefusal] = useState<ActRefusal>(null);
  const [busy, setBusy] = useState(false);

  async function carry(rows: readonly CarryOverRow[]) {
    setBusy(true);
    const refused = await onCarry(rows);
    setBusy(false);
    if (refused === null) onClose();
    else setRefusal(refused);
  }

  const count = data?.items.length ?? 0;
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="Carry approvals over"
      description="Values that moved no more than the show’s tolerance keep their approval."
      className="sm:w-[40rem]"
    >
      {error !== null ? (
        <p role="alert" className="text-14 text-wrong">
          {error.message}
        </p>
      ) : data === undefined ? (
        <p role="status" className="text-14 text-ink-3">
          Reading what moved
        </p>
      ) : (
        <div className="flex flex-col gap-4">
          {count === 0 ? (
            <p className="text-14 text-ink-2">Nothing that is out of date stays within the tolerance.</p>
          ) : (
            <div className="max-h-[45dvh] overflow-y-auto">
              <Table>
                <thead>
                  <tr>
                    <TableHead>Part</TableHead>
                    <TableHead>Since its approval</TableHead>
                  </tr>
                </thead>
                <tbody>
                  {data.items.map((row) => (
                    <TableRow key={`${row.asset}/${row.part}`}>
                      <TableCell>
                        <span className="text-ink-3">{row.asset}</span> {row.part}
                      </TableCell>
                      <TableCell className="text-13">{row.verdict}</TableCell>
                    </TableRow>
                  ))}
                </tbody>
              </Table>
            </div>
          )}
          {data.own + data.beyond_tolerance > 0 ? <p className="text-13 text-ink-2">{restWords(data)}</p> : null}
          <FormRefusal>{refusal?.message ?? null}</FormRefusal>
          <div className="flex justify-end gap-2">
            <Button look="quiet" onClick={onClose}>
              {count === 0 ? 'Close' : 'Leave it'}
            </Button>
            {count === 0 ? null : (
              <Button look="filled" autoFocus disabled={busy} onClick={() => void carry(data.items)}>
                {count === 1 ? 'Carry one over' : `Carry ${count.toLocaleString('en')} over`}
              </Button>
            )}
          </div>
        </div>
      )}
    </Dialog>
  );
}

function restWords({ own, beyond_tolerance: beyond }: CarryOverAnswer): string {
  const parts = [
    beyond > 0 ? `${beyond.toLocaleString('en')} moved more` : '',
    own > 0 ? `${own.toLocaleString('en')} you set yourself` : '',
  ].filter(Boolean);
  return `${parts.join(', ')}; ${beyond + own === 1 ? 'it waits' : 'they wait'} in the queue.`;
}
