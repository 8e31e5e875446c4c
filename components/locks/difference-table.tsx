import { Figure } from '@/components/ui/figure';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { OutdatedLock } from '@/lib/rules/outdated-lock';
import { assetInShot } from '@/lib/rules/shot-words';
import { METRES_PER, type LinearUnit } from '@/lib/rules/units';

const SHARE = { before: 4, after: 4 };

/** Every difference of locked values from the values now, a row each; shares in %, the rotation in degrees. */
export function DifferenceTable({ locks, unit }: { locks: readonly OutdatedLock[]; unit: LinearUnit }) {
  return (
    <div className="max-h-[50dvh] overflow-y-auto border-y border-rule">
      <Table>
        <thead>
          <tr>
            <TableHead>Shot</TableHead>
            <TableHead>Part</TableHead>
            <TableHead>Version</TableHead>
            <TableHead className="text-right">Locked, kg</TableHead>
            <TableHead className="text-right">New, kg</TableHead>
            <TableHead className="text-right">Mass, %</TableHead>
            <TableHead className="text-right">Centre, {unit}</TableHead>
            <TableHead className="text-right">of size, %</TableHead>
            <TableHead className="text-right">
              I<sub>1</sub>, %
            </TableHead>
            <TableHead className="text-right">
              I<sub>2</sub>, %
            </TableHead>
            <TableHead className="text-right">
              I<sub>3</sub>, %
            </TableHead>
            <TableHead className="text-right">Axes, °</TableHead>
          </tr>
        </thead>
        <tbody>
          {locks.map((lock) => (
            <DifferenceRow key={lock.lock} lock={lock} unit={unit} />
          ))}
        </tbody>
      </Table>
    </div>
  );
}

function DifferenceRow({ lock, unit }: { lock: OutdatedLock; unit: LinearUnit }) {
  const { differences: d, current, locked } = lock;
  const shift = d === null ? null : Math.hypot(...d.com_shift_m) / METRES_PER[unit];
  const percent = (value: number | undefined) => (value === undefined ? null : value * 100);
  return (
    <TableRow>
      <TableCell>{lock.shot}</TableCell>
      <TableCell>
        {assetInShot(lock.asset, lock.copy)} {lock.part ?? lock.body}
      </TableCell>
      <TableCell className="font-mono text-13 text-ink-2">{locked.version === current?.version ? locked.version : `${locked.version} → ${current?.version ?? '–'}`}</TableCell>
      <TableCell className="text-right">
        <Figure value={locked.mass_kg} notation="engineering" />
      </TableCell>
      <TableCell className="text-right">
        <Figure value={current?.mass_kg ?? null} notation="engineering" />
      </TableCell>
      {[percent(d?.mass_change), shift, percent(d?.com_shift_of_size), percent(d?.principal_change[0]), percent(d?.principal_change[1]), percent(d?.principal_change[2]), d?.rotation_deg ?? null].map((value, i) => (
        <TableCell key={i} className="text-right">
          <Figure value={value} decimals={3} align={SHARE} />
        </TableCell>
      ))}
    </TableRow>
  );
}
