import { Moment } from '@/components/ui/moment';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { PartSetting } from '@/lib/rules/part-detail';
import { setByWords } from '@/lib/rules/source-words';
import type { LinearUnit } from '@/lib/rules/units';
import { changeWords } from './change-words';

/** Everything that was ever set on the part, newest first. */
export function PartSettings({ settings, unit }: { settings: readonly PartSetting[]; unit: LinearUnit }) {
  if (settings.length === 0) return <p className="text-14 text-ink-2">Nothing has been set on this part.</p>;
  return (
    <Table>
      <thead>
        <tr>
          <TableHead>Set</TableHead>
          <TableHead>By</TableHead>
          <TableHead>When</TableHead>
        </tr>
      </thead>
      <tbody>
        {settings.map((setting) => (
          <TableRow key={`${setting.set_at} ${setting.set_by}`}>
            <TableCell className="whitespace-normal">
              {changeWords({ ...setting, left_out: setting.left_out ? true : undefined }, unit)}
            </TableCell>
            <TableCell className="text-13 text-ink-2">{setByWords(setting)}</TableCell>
            <TableCell className="text-13 text-ink-2">
              <Moment at={setting.set_at} />
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}
