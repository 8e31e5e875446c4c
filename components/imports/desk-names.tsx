'use client';

import { useId, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
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
      <div className="flex flex-wrap items-baseline gap-x-3 gap-y-1 text-13">
        <span className="text-ink-3">Names</span>
        <span className="text-ink-2">{pattern.typed.trim() === '' ? 'version token and folder' : <code className="font-mono">{pattern.typed.trim()}</code>}</span>
        {isOpen ? null : <span className={unmatched > 0 ? 'text-ink' : 'text-ink-3'}>{standing}</span>}
        <Button size="small" look="quiet" aria-expanded={isOpen} aria-controls={id} onClick={() => setIsOpen(!isOpen)}>
          {isOpen ? 'Close' : 'Try a pattern'}
        </Button>
      </div>
      {isOpen ? (
        <div id={id} className="flex flex-wrap items-end gap-x-3 gap-y-2">
          <Field label="Name pattern" hint="{asset}, {version} and {category} stand for what is read, * for anything within a folder’s name. Empty: the built-in rule." className="w-full max-w-2xl">
            <Input className="font-mono" spellCheck={false} autoComplete="off" value={pattern.typed} disabled={disabled} aria-invalid={pattern.fault !== null || undefined} placeholder="{category}/{asset}_v{version}" onChange={(event) => pattern.type(event.target.value)} />
          </Field>
          {pattern.typed.trim() === (standard ?? '') ? null : (
            <Button size="small" look="quiet" disabled={disabled} onClick={() => pattern.type(standard ?? '')}>
              As the show has it
            </Button>
          )}
          <p role="status" className={pattern.fault === null ? 'w-full text-13 text-ink-2' : 'w-full text-13 text-wrong'}>
            {standing}
          </p>
        </div>
      ) : null}
    </div>
  );
}
