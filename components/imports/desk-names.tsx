'use client';

import { useId, useState } from 'react';
import { Button } from '@/components/ui/button';
import { cn } from '@/components/ui/cn';
import { Input } from '@/components/ui/input';
import type { DeskRow } from '@/hooks/use-import-desk';

interface DeskNamesProps {
  pattern: { typed: string; type: (text: string) => void; fault: string | null; isOwn: boolean };
  /** The show's own; null for the built-in rule. */
  standard: string | null;
  rows: readonly DeskRow[];
  disabled: boolean;
}

/** How names are read, and a pattern to try on what was dropped: it holds for this import alone. */
export function DeskNames({ pattern, standard, rows, disabled }: DeskNamesProps) {
  const [isOpen, setIsOpen] = useState(false);
  const id = useId();
  const read = rows.filter((row) => row.preview !== null);
  const unmatched = read.filter((row) => row.preview?.outcome === 'unmatched').length;
  const matched = unmatched === 0 ? 'All names match' : `${(read.length - unmatched).toLocaleString('en')} of ${read.length.toLocaleString('en')} names match`;
  const standing = pattern.fault === null ? `${matched}.${pattern.isOwn ? ' For this import alone.' : ''}` : pattern.fault;
  return (
    <div className="flex flex-col gap-2">
      <div className="flex items-center gap-x-3 text-13">
        <p className="flex min-w-0 flex-wrap items-baseline gap-x-3">
          <span className="text-ink-3">Names</span>
          {isOpen ? null : <span className="min-w-0 break-all text-ink-2">{pattern.typed.trim() === '' ? 'version token and folder' : <code className="font-mono">{pattern.typed.trim()}</code>}</span>}
          <span role="status" className={cn(pattern.fault !== null ? 'text-wrong' : unmatched > 0 ? 'text-ink' : 'text-ink-3', !isOpen && unmatched === 0 && 'max-sm:sr-only')}>
            {standing}
          </span>
        </p>
        <Button size="small" look="quiet" className="max-sm:-mr-2.5 max-sm:ml-auto" aria-expanded={isOpen} aria-controls={id} onClick={() => setIsOpen(!isOpen)}>
          {isOpen ? 'Close' : 'Try a pattern'}
        </Button>
      </div>
      {isOpen ? (
        <div id={id} className="grid gap-x-2 gap-y-1 sm:grid-cols-[minmax(0,42rem)_auto] sm:justify-start">
          <label htmlFor={`${id}-pattern`} className="text-13 text-ink-2 sm:col-span-2">
            Name pattern
          </label>
          <Input id={`${id}-pattern`} aria-describedby={`${id}-hint`} className="font-mono" spellCheck={false} autoComplete="off" value={pattern.typed} disabled={disabled} aria-invalid={pattern.fault !== null || undefined} placeholder="{category}/{asset}_v{version}" onChange={(event) => pattern.type(event.target.value)} />
          {pattern.typed.trim() === (standard ?? '') ? null : (
            <Button disabled={disabled} onClick={() => pattern.type(standard ?? '')}>
              As the show has it
            </Button>
          )}
          <p id={`${id}-hint`} className="text-13 text-ink-3 sm:col-span-2">
            {'{asset}, {version} and {category} stand for what is read, * for anything within a folder’s name. Empty: the built-in rule.'}
          </p>
        </div>
      ) : null}
    </div>
  );
}
