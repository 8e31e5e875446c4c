import { Ellipsis } from 'lucide-react';
import Link from 'next/link';
import { StateMark } from '@/components/states/state-mark';
import { Checkbox } from '@/components/ui/checkbox';
import { cn } from '@/components/ui/cn';
import { ENGINEERING_WIDTHS, Figure } from '@/components/ui/figure';
import { IconButton } from '@/components/ui/icon-button';
import { Menu, MenuItem, MenuRule } from '@/components/ui/menu';
import { TableCell, TableRow } from '@/components/ui/table';
import { When } from '@/components/users/when';
import type { ShotActs, ShotSlot } from '@/lib/rules/shot-detail';
import { compareLockHref, partPageHref } from './shot-hrefs';
import { slotState, waitsFor } from '@/lib/rules/shot-slots';

export interface SlotRowActs {
  acts: ShotActs;
  onLock: (slot: ShotSlot) => void;
  onUnlock: (slot: ShotSlot) => void;
  onRelock: (slot: ShotSlot) => void;
  onOverride: (slot: ShotSlot) => void;
  onDrop: (slot: ShotSlot) => void;
}

interface SlotRowProps extends SlotRowActs {
  show: string;
  slot: ShotSlot;
  selectable: boolean;
  chosen: boolean;
  onChoose: (on: boolean) => void;
}

/** One part in a shot: what it is locked to, and what stands against that. */
export function SlotRow({ show, slot, selectable, chosen, onChoose, ...menu }: SlotRowProps) {
  const { lock, override } = slot;
  return (
    <>
      <TableRow className={cn(override !== null && 'border-b-0', chosen ? 'bg-selected' : 'hover:bg-bench')}>
        {selectable ? (
          <TableCell className="pr-0 pl-4 md:pl-6">
            <Checkbox aria-label={`${slot.asset} ${slot.part}`} checked={chosen} onCheckedChange={(on) => onChoose(on === true)} />
          </TableCell>
        ) : null}
        <TableCell className={selectable ? undefined : 'pl-7 md:pl-9'}>
          {slot.current === null ? (
            slot.part
          ) : (
            <Link href={partPageHref(show, slot.asset, slot.part)} className="link">
              {slot.part}
            </Link>
          )}
        </TableCell>
        <TableCell>
          <StateMark state={slotState(slot)} />
        </TableCell>
        <TableCell>
          <Against show={show} slot={slot} />
        </TableCell>
        <TableCell className="font-mono text-13 text-ink-2">{lock?.version ?? '–'}</TableCell>
        <TableCell className="text-right">
          <Figure value={lock?.mass_kg ?? null} notation="engineering" align={ENGINEERING_WIDTHS} />
        </TableCell>
        <TableCell className="text-13 text-ink-2">
          {lock === null ? null : (
            <span title={`Approved by ${lock.approved_by}, ${lock.approved_at}`}>
              {lock.locked_by}, <When at={lock.locked_at} />
            </span>
          )}
        </TableCell>
        <TableCell className="py-0 pr-4 md:pr-6">
          <SlotMenu show={show} slot={slot} {...menu} />
        </TableCell>
      </TableRow>
      {override === null ? null : <OverrideLine slot={slot} selectable={selectable} chosen={chosen} />}
    </>
  );
}

function Against({ show, slot }: { show: string; slot: ShotSlot }) {
  const { lock, outdated } = slot;
  if (outdated !== null) {
    return (
      <span className="inline-flex items-baseline gap-3">
        <span className={outdated.beyond_tolerance ? 'font-medium' : 'text-ink-2'}>{outdated.verdict}</span>
        <Link href={compareLockHref(show, outdated.lock)} className="link text-13">
          Compare<span className="sr-only"> {slot.asset} {slot.part}</span>
        </Link>
        {outdated.current === null || outdated.current.value_id !== null ? null : <span className="text-13 text-ink-3">new value not approved yet</span>}
      </span>
    );
  }
  if (lock === null) return <span className="text-13 text-ink-2">{waitsFor(slot)}</span>;
  return <span className="text-13 text-ink-3">the same</span>;
}

/** An override stands under its part, always open: a shot that differs from the show says so without a click. */
function OverrideLine({ slot, selectable, chosen }: { slot: ShotSlot; selectable: boolean; chosen: boolean }) {
  const { override, current, lock } = slot;
  if (override === null) return null;
  const state = lock?.of_override && slot.outdated === null ? 'locked' : override.state === 'approved' ? 'approved' : override.state === 'measured' ? 'not approved yet' : override.state === 'blocked' ? 'blocked' : 'no mass';
  return (
    <tr className={cn('border-b border-rule', chosen && 'bg-selected')}>
      {selectable ? <td /> : null}
      <td colSpan={7} className={cn('pb-2 text-13 text-ink-2', selectable ? 'px-2.5' : 'pl-7 md:pl-9')}>
        <span className="border-l-2 border-brass pl-2.5">
          <span className="font-medium text-ink">Override</span>{' '}
          {override.mass_kg === null ? null : (
            <>
              <Figure value={override.mass_kg} notation="engineering" className="text-ink" /> kg
              {current?.mass_kg == null ? null : (
                <>
                  {' '}
                  instead of <Figure value={current.mass_kg} notation="engineering" /> kg
                </>
              )}
              ,{' '}
            </>
          )}
          {state}: “{override.reason}” {override.drafted_by}, <When at={override.drafted_at} dateOnly />
        </span>
      </td>
    </tr>
  );
}

function SlotMenu({ show, slot, acts, onLock, onUnlock, onRelock, onOverride, onDrop }: { show: string; slot: ShotSlot } & SlotRowActs) {
  const { lock, outdated, override, current } = slot;
  const none = !acts.may_lock && !acts.may_draft && outdated === null;
  if (none) return null;
  return (
    <Menu
      trigger={
        <IconButton label={`Acts on ${slot.asset} ${slot.part}`} className="size-7">
          <Ellipsis aria-hidden />
        </IconButton>
      }
    >
      {acts.may_lock && lock === null && slot.ready_value_id !== null ? <MenuItem onSelect={() => onLock(slot)}>Lock</MenuItem> : null}
      {acts.may_lock && outdated?.current?.value_id ? <MenuItem onSelect={() => onRelock(slot)}>Re-lock to the new value…</MenuItem> : null}
      {acts.may_lock && lock !== null ? <MenuItem onSelect={() => onUnlock(slot)}>Unlock…</MenuItem> : null}
      {acts.may_draft && current !== null && slot.row === 'part' ? (
        <>
          {acts.may_lock && (lock !== null || slot.ready_value_id !== null) ? <MenuRule /> : null}
          <MenuItem onSelect={() => onOverride(slot)}>{override === null ? 'Override in this shot…' : 'Change the override…'}</MenuItem>
        </>
      ) : null}
      {acts.may_draft && override !== null ? <MenuItem onSelect={() => onDrop(slot)}>Drop the override…</MenuItem> : null}
      {outdated === null ? null : (
        <MenuItem asChild>
          <Link href={compareLockHref(show, outdated.lock)}>Compare</Link>
        </MenuItem>
      )}
    </Menu>
  );
}
