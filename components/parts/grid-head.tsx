'use client';

import { ArrowDown, ArrowUp } from 'lucide-react';
import { cn } from '@/components/ui/cn';
import type { PartColumn } from '@/hooks/use-part-filters';
import type { ShowFrame } from '@/lib/rules/show-frame';
import type { ColumnSpec } from './part-columns';

export const HEAD_HEIGHT = 36;

interface GridHeadProps {
  specs: readonly ColumnSpec[];
  template: string;
  frame: ShowFrame;
  sort: PartColumn | null;
  down: boolean;
  onSort: (column: PartColumn) => void;
}

/** The head of the table; a column is ordered by a click. Units stand here and never in a cell. */
export function GridHead({ specs, template, frame, sort, down, onSort }: GridHeadProps) {
  return (
    <div
      role="row"
      aria-rowindex={1}
      className="sticky top-0 z-20 grid h-9 border-b border-rule bg-ground"
      style={{ gridTemplateColumns: template }}
    >
      {specs.map((spec) => {
        const unit = spec.unit?.(frame);
        const sorted = sort === spec.id;
        const label = (
          <span className="truncate">
            {spec.label}
            {unit === undefined ? null : `, ${unit}`}
          </span>
        );
        const style = cn(
          'flex min-w-0 items-center gap-1 px-2 text-12 text-ink-3',
          spec.id === 'name' && 'pl-3',
          spec.figures && 'justify-end pr-10',
        );
        return (
          <div
            key={spec.id}
            role="columnheader"
            aria-sort={sorted ? (down ? 'descending' : 'ascending') : undefined}
            className={cn('flex min-w-0 items-stretch', spec.id === 'name' && 'sticky left-0 z-1 bg-ground')}
          >
            {spec.id === 'beam' ? (
              <span className={style}>{label}</span>
            ) : (
              <button
                type="button"
                tabIndex={-1}
                title={spec.name}
                onClick={() => onSort(spec.id)}
                className={cn(style, 'flex-1 hover:text-ink', sorted && 'text-ink')}
              >
                {label}
                {sorted ? (
                  down ? (
                    <ArrowDown aria-hidden className="size-3 shrink-0 text-brass" />
                  ) : (
                    <ArrowUp aria-hidden className="size-3 shrink-0 text-brass" />
                  )
                ) : null}
              </button>
            )}
          </div>
        );
      })}
    </div>
  );
}
