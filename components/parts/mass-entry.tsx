'use client';

import { useId, useState, type KeyboardEvent } from 'react';
import { formatFixed } from '@/lib/rules/format-figure';
import { parseMassEntry, type MassEntry as Entry } from '@/lib/rules/parse-mass-entry';

interface MassEntryProps {
  /** What was typed before the editor stood. */
  start: string;
  /** How many parts it sets. */
  parts: number;
  /** A target mass over several parts is shared by their volumes (an asset's row) or set on each. */
  shared: boolean;
  materials: readonly string[];
  onSet: (entry: Entry) => void;
  /** Nothing is set; `back` when the keyboard stays with the table. */
  onLeave: (back: boolean) => void;
}

/** The mass of a row being typed: a mass, a density or a material. */
export function MassEntry({ start, parts, shared, materials, onSet, onLeave }: MassEntryProps) {
  const [text, setText] = useState(start);
  const [tried, setTried] = useState(false);
  const helpId = useId();
  const parsed = parseMassEntry(text, materials);
  const starting =
    text.length > 0 && /^[a-z]/i.test(text)
      ? materials.filter((name) => name.toLowerCase().startsWith(text.toLowerCase())).slice(0, 5)
      : [];

  function onKeyDown(event: KeyboardEvent) {
    event.stopPropagation();
    if (event.key === 'Escape') onLeave(true);
    if (event.key === 'Tab' && starting.length > 0 && !parsed.ok) {
      event.preventDefault();
      setText(starting[0]);
    }
    if (event.key !== 'Enter') return;
    event.preventDefault();
    if (parsed.ok) onSet(parsed.entry);
    else setTried(true);
  }

  const wrong = !parsed.ok && (tried || starting.length === 0) && text.trim() !== '';
  return (
    <span className="relative block w-full">
      <input
        ref={(input) => input?.focus()}
        value={text}
        aria-label="Mass, density or material"
        aria-invalid={wrong || undefined}
        aria-describedby={helpId}
        autoComplete="off"
        spellCheck={false}
        onChange={(event) => setText(event.target.value)}
        onKeyDown={onKeyDown}
        onBlur={() => onLeave(false)}
        onFocus={(event) => event.target.setSelectionRange(text.length, text.length)}
        className="h-7 w-full rounded border border-brass bg-ground px-2 text-right font-mono text-13 text-ink outline-none aria-invalid:border-wrong"
      />
      <span
        id={helpId}
        role="status"
        className="absolute top-8 right-0 z-20 block w-64 rounded border border-edge bg-raised px-3 py-2 text-left text-13 text-ink-2"
      >
        {parsed.ok ? (
          <>
            <span className="block text-ink">{entryWords(parsed.entry)}</span>
            {partsWords(parts, shared && parsed.entry.kind === 'target_mass')} · Enter sets
          </>
        ) : starting.length > 0 && !tried ? (
          <>
            {starting.map((name, index) => (
              <span key={name} className={index === 0 ? 'block text-ink' : 'block'}>
                {name}
              </span>
            ))}
            Tab completes
          </>
        ) : (
          <span className={wrong ? 'text-wrong' : undefined}>{parsed.message}</span>
        )}
      </span>
    </span>
  );
}

function partsWords(parts: number, shared: boolean): string {
  if (parts === 1) return 'one part';
  const count = `${parts.toLocaleString('en')} parts`;
  return shared ? `shared by volume over ${count}` : `each of ${count}`;
}

function entryWords(entry: Entry): string {
  switch (entry.kind) {
    case 'target_mass':
      return `Target mass ${formatFixed(entry.massKg, 6)} kg`;
    case 'density':
      return `Density ${formatFixed(entry.densityKgPerM3)} kg/m³`;
    case 'areal_density':
      return `Weight per area ${formatFixed(entry.arealDensityKgPerM2)} kg/m²`;
    case 'material':
      return `Material ${entry.name}`;
  }
}
