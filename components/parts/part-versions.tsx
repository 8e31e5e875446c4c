import Link from 'next/link';
import { Figure, ENGINEERING_WIDTHS } from '@/components/ui/figure';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { Moment } from '@/components/ui/moment';
import { compareHref } from '@/lib/rules/compare-href';
import type { PartVersion } from '@/lib/rules/part-detail';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { METRES_PER } from '@/lib/rules/units';

interface PartVersionsProps {
  frame: ShowFrame;
  asset: string;
  part: string;
  versions: readonly PartVersion[];
}

/** The part in each version of its asset, newest first, its volume against the version before. */
export function PartVersions({ frame, asset, part, versions }: PartVersionsProps) {
  const unit = frame.linear_unit;
  const cubic = METRES_PER[unit] ** 3;
  const square = METRES_PER[unit] ** 2;
  return (
    <Table>
      <thead>
        <tr>
          <TableHead>Version</TableHead>
          <TableHead className="text-right">Volume, {unit}³</TableHead>
          <TableHead className="text-right">Change, %</TableHead>
          <TableHead className="text-right">Cage, {unit}³</TableHead>
          <TableHead className="text-right">Area, {unit}²</TableHead>
          <TableHead className="text-right">Faces</TableHead>
          <TableHead>Imported</TableHead>
          <TableHead>
            <span className="sr-only">Compare</span>
          </TableHead>
        </tr>
      </thead>
      <tbody>
        {versions.map((version, index) => (
          <TableRow key={version.version}>
            <TableCell className="font-mono text-13">{version.version}</TableCell>
            {version.present ? (
              <>
                <TableCell className="text-right">
                  <Figure value={inUnits(version.volume_m3, cubic)} notation="engineering" align={ENGINEERING_WIDTHS} />
                </TableCell>
                <TableCell className="text-right">
                  <Figure
                    value={changePercent(version, versions[index + 1])}
                    decimals={2}
                    align={{ before: 4, after: 3 }}
                  />
                </TableCell>
                <TableCell className="text-right">
                  <Figure
                    value={inUnits(version.cage_volume_m3, cubic)}
                    notation="engineering"
                    align={ENGINEERING_WIDTHS}
                  />
                </TableCell>
                <TableCell className="text-right">
                  <Figure value={inUnits(version.area_m2, square)} notation="engineering" align={ENGINEERING_WIDTHS} />
                </TableCell>
                <TableCell className="text-right font-mono text-13">{version.faces?.toLocaleString('en')}</TableCell>
              </>
            ) : (
              <TableCell colSpan={5} className="text-ink-3">
                not in this version
              </TableCell>
            )}
            <TableCell className="text-13 text-ink-2">
              <Moment at={version.created_at} /> by {version.created_by}
            </TableCell>
            <TableCell className="text-13">
              {version.current || !version.present ? null : (
                <Link href={compareHref(frame.code, { asset, part, a: version.version, b: 'current' })} className="link">
                  Compare<span className="sr-only"> {version.version} with the current version</span>
                </Link>
              )}
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}

function inUnits(value: number | null, unit: number): number | null {
  return value === null ? null : value / unit;
}

function changePercent(now: PartVersion, before: PartVersion | undefined): number | null {
  if (before === undefined || now.volume_m3 === null || before.volume_m3 === null || before.volume_m3 === 0)
    return null;
  return (now.volume_m3 / before.volume_m3 - 1) * 100;
}
