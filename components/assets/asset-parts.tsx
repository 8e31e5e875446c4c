import Link from 'next/link';
import { RowBeam } from '@/components/beam/row-beam';
import { partHref } from '@/components/parts/part-href';
import { StateMark } from '@/components/states/state-mark';
import { cn } from '@/components/ui/cn';
import { ENGINEERING_WIDTHS, Figure } from '@/components/ui/figure';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { PartRow } from '@/lib/rules/part-row';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { METRES_PER } from '@/lib/rules/units';

interface AssetPartsProps {
  frame: ShowFrame;
  rows: readonly PartRow[];
  /** The part that the drawing shows. */
  chosen: string;
  onChoose: (part: string) => void;
}

/** An asset's parts; choosing one shows it in the drawing, its name opens its page. */
export function AssetParts({ frame, rows, chosen, onChoose }: AssetPartsProps) {
  const unit = frame.linear_unit;
  const cubic = METRES_PER[unit] ** 3;
  const largest = Math.max(0, ...rows.map(({ bounds_m: box }) => (box === null ? 0 : Math.max(box[3] - box[0], box[4] - box[1], box[5] - box[2]))));
  return (
    <Table>
      <thead>
        <tr>
          <TableHead className="pl-4 md:pl-6">Part</TableHead>
          <TableHead>Construction</TableHead>
          <TableHead className="text-right">Mass, kg</TableHead>
          <TableHead>Balance</TableHead>
          <TableHead className="text-right">Volume, {unit}³</TableHead>
          <TableHead>State</TableHead>
          <TableHead>
            <span className="sr-only">In the drawing</span>
          </TableHead>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <TableRow key={row.part_id} className={cn(row.part === chosen && 'bg-selected')}>
            <TableCell className="pl-4 md:pl-6">
              <Link href={partHref(frame.code, row)} className="link">
                {row.part}
              </Link>
            </TableCell>
            <TableCell className="text-13 text-ink-2">{row.construction}</TableCell>
            <TableCell className="text-right">
              <Figure value={row.mass_kg} notation="engineering" align={ENGINEERING_WIDTHS} />
            </TableCell>
            <TableCell>
              <RowBeam of={row} unit={unit} largest={largest} />
            </TableCell>
            <TableCell className="text-right">
              <Figure value={row.volume_m3 === null ? null : row.volume_m3 / cubic} notation="engineering" align={ENGINEERING_WIDTHS} />
            </TableCell>
            <TableCell>
              <StateMark state={row.state} />
            </TableCell>
            <TableCell>
              <button type="button" aria-pressed={row.part === chosen} onClick={() => onChoose(row.part ?? '')} className="link text-13">
                Show<span className="sr-only"> {row.part}</span>
              </button>
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}
