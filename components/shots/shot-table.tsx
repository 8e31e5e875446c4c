import Link from 'next/link';
import { Fragment } from 'react';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ShotEntry } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';
import { assetsWords } from './assets-words';
import { sequenceHref, shotCsvHref, shotHref } from './shot-hrefs';
import { ShotMark } from './shot-mark';

/** Shots under their sequences, each with its verdict. */
export function ShotTable({ show, shots }: { show: string; shots: readonly ShotEntry[] }) {
  const sequences = [...new Set(shots.map((shot) => shot.sequence))];
  return (
    <Table>
      <thead>
        <tr>
          <TableHead className="pl-4 md:pl-6">Sequence and shot</TableHead>
          <TableHead>Verdict</TableHead>
          <TableHead className="text-right">Locked</TableHead>
          <TableHead className="text-right">Missing</TableHead>
          <TableHead className="text-right">Out of date</TableHead>
          <TableHead className="text-right">Overrides</TableHead>
          <TableHead className="w-full">Assets</TableHead>
          <TableHead className="pr-4 md:pr-6">Locked rows</TableHead>
        </tr>
      </thead>
      <tbody>
        {sequences.map((sequence) => {
          const own = shots.filter((shot) => shot.sequence === sequence);
          return (
            <Fragment key={sequence}>
              <tr className="h-9.5 border-b border-rule bg-bench">
                <th scope="rowgroup" className="pl-4 text-left font-medium md:pl-6">
                  <Link href={sequenceHref(show, sequence)} className="link">
                    {sequence}
                  </Link>
                  <span className="ml-2 text-13 font-normal text-ink-3">{counted(own.length, 'shot')}</span>
                </th>
                <td colSpan={7} />
              </tr>
              {own.map((shot) => (
                <ShotRow key={shot.code} show={show} shot={shot} />
              ))}
            </Fragment>
          );
        })}
      </tbody>
    </Table>
  );
}

function ShotRow({ show, shot }: { show: string; shot: ShotEntry }) {
  return (
    <TableRow className="hover:bg-bench">
      <TableCell className="pl-7 md:pl-9">
        <Link href={shotHref(show, shot.code)} className="link">
          {shot.code}
        </Link>
        {shot.title === null ? null : <span className="ml-2 text-13 text-ink-3 max-md:hidden">{shot.title}</span>}
      </TableCell>
      <TableCell>
        <ShotMark of={shot} />
      </TableCell>
      <Count value={shot.locked} />
      <Count value={shot.missing} />
      <Count value={shot.outdated} />
      <Count value={shot.overrides} />
      <TableCell className="max-w-0 truncate text-13 text-ink-2" title={assetsWords(shot.assets)}>
        {assetsWords(shot.assets)}
      </TableCell>
      <TableCell className="pr-4 md:pr-6">
        {shot.locked === 0 ? null : (
          <a href={shotCsvHref(show, shot.code)} download className="link text-13">
            CSV<span className="sr-only"> of {shot.code}</span>
          </a>
        )}
      </TableCell>
    </TableRow>
  );
}

function Count({ value }: { value: number }) {
  return <TableCell className={value === 0 ? 'text-right font-mono text-13 text-ink-3' : 'text-right font-mono text-13'}>{value === 0 ? '–' : value.toLocaleString('en')}</TableCell>;
}
