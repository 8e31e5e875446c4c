import { Fragment } from 'react';
import { Checkbox } from '@/components/ui/checkbox';
import { Table, TableHead } from '@/components/ui/table';
import type { ShotSlot } from '@/lib/rules/shot-detail';
import { assetInShot, counted } from '@/lib/rules/shot-words';
import { ShotMark } from './shot-mark';
import { SlotRow, type SlotRowActs } from './slot-row';
import { slotKey } from '@/lib/rules/shot-slots';

interface SlotTableProps extends SlotRowActs {
  show: string;
  slots: readonly ShotSlot[];
  chosen: ReadonlySet<string>;
  onChoose: (keys: readonly string[], on: boolean) => void;
  /** Whether rows can be chosen: whoever locks. */
  selectable: boolean;
}

/** What is in a shot, part by part under its asset and copy. */
export function SlotTable({ show, slots, chosen, onChoose, selectable, ...acts }: SlotTableProps) {
  const groups = new Map<string, ShotSlot[]>();
  for (const slot of slots) {
    const name = assetInShot(slot.asset, slot.copy);
    groups.set(name, [...(groups.get(name) ?? []), slot]);
  }
  const pick = (of: readonly ShotSlot[], label: string) => {
    const keys = of.map(slotKey);
    const count = keys.filter((key) => chosen.has(key)).length;
    return (
      <Checkbox aria-label={label} checked={count === 0 ? false : count === keys.length ? true : 'indeterminate'} onCheckedChange={(on) => onChoose(keys, on === true)} />
    );
  };
  const columns = selectable ? 8 : 7;
  return (
    <Table>
      <thead>
        <tr>
          {selectable ? <TableHead className="w-8 pr-0 pl-4 md:pl-6">{pick(slots, 'Every part of the shot')}</TableHead> : null}
          <TableHead className={selectable ? 'min-w-40' : 'min-w-40 pl-4 md:pl-6'}>Asset and part</TableHead>
          <TableHead>State</TableHead>
          <TableHead className="w-full min-w-56">Against the value now</TableHead>
          <TableHead>Locked to</TableHead>
          <TableHead className="pr-11 text-right">Mass, kg</TableHead>
          <TableHead>Locked by</TableHead>
          <TableHead className="pr-4 md:pr-6">
            <span className="sr-only">Acts</span>
          </TableHead>
        </tr>
      </thead>
      <tbody>
        {[...groups].map(([name, own]) => (
          <Fragment key={name}>
            <tr className="h-9.5 border-b border-rule bg-bench">
              {selectable ? <td className="pr-0 pl-4 md:pl-6">{pick(own, `Every part of ${name}`)}</td> : null}
              <th scope="rowgroup" className={selectable ? 'px-2.5 text-left font-medium' : 'pl-4 text-left font-medium md:pl-6'}>
                {name} <span className="ml-1 text-13 font-normal text-ink-3">{counted(own.length, 'part')}</span>
              </th>
              <td colSpan={columns - (selectable ? 2 : 1)} className="px-2.5">
                <ShotMark of={standingOf(own)} />
              </td>
            </tr>
            {own.map((slot) => (
              <SlotRow key={slotKey(slot)} show={show} slot={slot} selectable={selectable} chosen={chosen.has(slotKey(slot))} onChoose={(on) => onChoose([slotKey(slot)], on)} {...acts} />
            ))}
          </Fragment>
        ))}
      </tbody>
    </Table>
  );
}

function standingOf(slots: readonly ShotSlot[]) {
  return {
    locked: slots.filter((slot) => slot.lock !== null).length,
    missing: slots.filter((slot) => slot.lock === null).length,
    outdated: slots.filter((slot) => slot.outdated !== null).length,
  };
}
