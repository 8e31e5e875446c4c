import Link from 'next/link';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { SequenceCell, SequenceDetail } from '@/lib/rules/shot-detail';
import { shotCsvHref, shotHref, shotJsonHref } from './shot-hrefs';
import { ShotMark } from './shot-mark';

/** A sequence's shots down, the assets in them across; each crossing says what is locked, missing or out of date there. */
export function SequenceMatrix({ show, sequence }: { show: string; sequence: SequenceDetail }) {
  return (
    <Table>
      <thead>
        <tr>
          <TableHead className="sticky left-0 z-1 bg-ground pl-4 md:pl-6">Shot</TableHead>
          <TableHead>Verdict</TableHead>
          {sequence.assets.map((asset) => (
            <TableHead key={asset}>
              <Link href={`/shows/${encodeURIComponent(show)}?q=${encodeURIComponent(asset)}`} className="link text-ink-2">
                {asset}
              </Link>
            </TableHead>
          ))}
          <TableHead className="w-full pr-4 text-right md:pr-6">Locked rows</TableHead>
        </tr>
      </thead>
      <tbody>
        {sequence.shots.map((shot) => (
          <TableRow key={shot.code} className="group h-9.5 hover:bg-bench">
            <th scope="row" className="sticky left-0 z-1 bg-ground pr-2.5 pl-4 text-left font-normal whitespace-nowrap group-hover:bg-bench md:pl-6">
              <Link href={shotHref(show, shot.code)} className="link">
                {shot.code}
              </Link>
              {shot.title === null ? null : <span className="ml-2 text-13 text-ink-3 max-md:hidden">{shot.title}</span>}
            </th>
            <TableCell>
              <ShotMark of={shot} />
            </TableCell>
            {sequence.assets.map((asset) => (
              <TableCell key={asset}>{shot.cells[asset] === undefined ? <span className="text-13 text-ink-3">–</span> : <Crossing cell={shot.cells[asset]} />}</TableCell>
            ))}
            <TableCell className="pr-4 text-right text-13 md:pr-6">
              {shot.locked === 0 ? (
                <span className="text-ink-3">nothing locked</span>
              ) : (
                <>
                  <a href={shotCsvHref(show, shot.code)} download className="link">
                    CSV<span className="sr-only"> of {shot.code}</span>
                  </a>{' '}
                  <a href={shotJsonHref(show, shot.code)} download className="link ml-2">
                    JSON<span className="sr-only"> of {shot.code}</span>
                  </a>
                </>
              )}
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}

function Crossing({ cell }: { cell: SequenceCell }) {
  return (
    <span className="inline-flex items-center gap-2 align-middle">
      <ShotMark of={cell} />
      {cell.copies > 1 ? <span className="text-13 text-ink-3">×{cell.copies}</span> : null}
      {cell.overrides > 0 ? <span className="border-l-2 border-brass pl-1.5 text-13 text-ink-2">override</span> : null}
    </span>
  );
}
