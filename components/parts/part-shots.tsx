import Link from 'next/link';
import { compareLockHref, shotHref } from '@/components/shots/shot-hrefs';
import { StateMark } from '@/components/states/state-mark';
import { ENGINEERING_WIDTHS, Figure } from '@/components/ui/figure';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ShotSlot } from '@/lib/rules/shot-detail';
import { slotKey, slotState, waitsFor } from '@/lib/rules/shot-slots';

/** The shots that a part is in, and what each has of it. */
export function PartShots({ show, slots }: { show: string; slots: readonly ShotSlot[] }) {
  if (slots.length === 0) return <p className="text-14 text-ink-2">No shot has it.</p>;
  return (
    <Table>
      <thead>
        <tr>
          <TableHead className="pl-0">Shot</TableHead>
          <TableHead>State</TableHead>
          <TableHead>Locked to</TableHead>
          <TableHead className="pr-11 text-right">Mass, kg</TableHead>
          <TableHead className="w-full">Against the value now</TableHead>
        </tr>
      </thead>
      <tbody>
        {slots.map((slot) => (
          <TableRow key={slotKey(slot)}>
            <TableCell className="pl-0">
              <Link href={shotHref(show, slot.shot)} className="link">
                {slot.shot}
              </Link>
              {slot.copy === null ? null : <span className="ml-2 text-13 text-ink-3">copy {slot.copy}</span>}
            </TableCell>
            <TableCell>
              <StateMark state={slotState(slot)} />
            </TableCell>
            <TableCell className="font-mono text-13 text-ink-2">{slot.lock?.version ?? '–'}</TableCell>
            <TableCell className="text-right">
              <Figure value={slot.lock?.mass_kg ?? null} notation="engineering" align={ENGINEERING_WIDTHS} />
            </TableCell>
            <TableCell>
              {slot.outdated === null ? (
                <span className="text-13 text-ink-3">{slot.lock === null ? waitsFor(slot) : 'the same'}</span>
              ) : (
                <>
                  {slot.outdated.verdict}{' '}
                  <Link href={compareLockHref(show, slot.outdated.lock)} className="link ml-2 text-13">
                    Compare<span className="sr-only"> with {slot.shot}</span>
                  </Link>
                </>
              )}
              {slot.override === null ? null : <span className="ml-3 border-l-2 border-brass pl-1.5 text-13 text-ink-2">override: “{slot.override.reason}”</span>}
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}
