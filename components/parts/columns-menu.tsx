'use client';

import { Columns3 } from 'lucide-react';
import { Menu, MenuItem, MenuRule, MenuToggle } from '@/components/ui/menu';
import { PART_COLUMNS, type PartColumn } from '@/hooks/use-part-filters';
import { COLUMN_SPECS } from './part-columns';

interface ColumnsMenuProps {
  columns: readonly PartColumn[] | null;
  onColumns: (columns: PartColumn[] | null) => void;
}

/** Which columns the table has. Once some are asked for it no longer drops what does not fit, but moves sideways. */
export function ColumnsMenu({ columns, onColumns }: ColumnsMenuProps) {
  const shown = columns ?? PART_COLUMNS;
  const toggle = (id: PartColumn, on: boolean) =>
    onColumns(PART_COLUMNS.filter((one) => (one === id ? on : shown.includes(one))));
  return (
    <Menu
      trigger={
        <button
          type="button"
          aria-label="Columns"
          title="Columns"
          className="inline-flex size-8 items-center justify-center rounded text-ink-2 hover:bg-raised hover:text-ink max-lg:hidden pointer-coarse:size-11"
        >
          <Columns3 aria-hidden className="size-4" />
        </button>
      }
    >
      <MenuItem onSelect={() => onColumns(null)}>Those that fit</MenuItem>
      <MenuRule />
      {COLUMN_SPECS.filter((spec) => spec.id !== 'name').map((spec) => (
        <MenuToggle key={spec.id} checked={shown.includes(spec.id)} onCheckedChange={(on) => toggle(spec.id, on)}>
          {spec.name}
        </MenuToggle>
      ))}
    </Menu>
  );
}
