'use client';

import { useDeferredValue, useMemo, useState } from 'react';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { TextArea } from '@/components/ui/text-area';
import { versionLabel } from '@/lib/rules/import-plan';
import { checkNamePattern, readName, type ReadName } from '@/lib/rules/name-pattern';
import { CATEGORY_WORDS } from '@/lib/rules/states';

const SAMPLES = [
  'creatures/tarnOx/tarnOx_v012.obj',
  'props/sledge/v003/sledge.obj',
  'props/bucket.v2.obj',
  'lantern.obj',
];

interface NamePatternFieldProps {
  value: string;
  onChange: (value: string) => void;
  error: string | null;
  disabled: boolean;
  /** As it is stored; null for the built-in rule. */
  stored: string | null;
  /** Paths that the show imported, the newest first. */
  names: readonly string[];
}

/** The show's name pattern, tried on names as they are typed. */
export function NamePatternField({ value, onChange, error, disabled, stored, names: imported }: NamePatternFieldProps) {
  const [samples, setSamples] = useState(SAMPLES.join('\n'));
  const pattern = value.trim();
  const wrong = pattern === '' ? null : checkNamePattern(pattern);
  const names = samples
    .split('\n')
    .map((line) => line.trim())
    .filter(Boolean)
    .slice(0, 50);
  return (
    <div className="flex flex-col gap-4">
      <Field
        label="Name pattern"
        hint="{asset}, {version} and {category} stand for what is read, * for anything within a folder’s name; matched against the end of the path. Empty: the built-in rule."
        error={wrong ?? error}
      >
        <Input
          className="font-mono"
          spellCheck={false}
          autoComplete="off"
          value={value}
          onChange={(event) => onChange(event.target.value)}
          disabled={disabled}
          placeholder="{category}/{asset}_v{version}"
        />
      </Field>
      {wrong !== null || imported.length === 0 ? null : <OnImported names={imported} stored={stored} pattern={pattern === '' ? null : pattern} />}
      <Field label="Names to try it on">
        <TextArea
          rows={4}
          className="font-mono text-13"
          spellCheck={false}
          value={samples}
          onChange={(event) => setSamples(event.target.value)}
        />
      </Field>
      {wrong !== null || names.length === 0 ? null : (
        <div aria-live="polite">
          <Table>
            <thead>
              <tr>
                <TableHead className="pl-0">Name</TableHead>
                <TableHead>Asset</TableHead>
                <TableHead>Category</TableHead>
                <TableHead>Version</TableHead>
              </tr>
            </thead>
            <tbody>
              {names.map((name, index) => (
                <SampleRow key={`${index} ${name}`} name={name} pattern={pattern === '' ? null : pattern} />
              ))}
            </tbody>
          </Table>
        </div>
      )}
    </div>
  );
}

const MOST_CHANGED = 8;

/** What the pattern makes of the names that the show has, and those that it would read otherwise than before. */
function OnImported({ names, stored, pattern: typed }: { names: readonly string[]; stored: string | null; pattern: string | null }) {
  const pattern = useDeferredValue(typed);
  const { unmatched, changed } = useMemo(() => {
    const read = names.map((name) => ({ name, before: readName(name, stored), now: readName(name, pattern) }));
    const same = (one: ReadName | null, other: ReadName | null): boolean => one?.asset === other?.asset && one?.version === other?.version;
    return { unmatched: read.filter((one) => one.now === null).length, changed: read.filter((one) => !same(one.before, one.now)) };
  }, [names, stored, pattern]);
  const of = names.length.toLocaleString('en');
  return (
    <div className="flex flex-col gap-1 text-13" aria-live="polite">
      <p className={unmatched > 0 ? 'text-ink' : 'text-ink-2'}>
        {unmatched === 0 ? `All ${of} imported names match` : `${(names.length - unmatched).toLocaleString('en')} of ${of} imported names match`}
        {changed.length === 0 ? '.' : `; ${changed.length.toLocaleString('en')} would be read otherwise in later imports.`}
      </p>
      <ul className="font-mono text-12 text-ink-2">
        {changed.slice(0, MOST_CHANGED).map(({ name, before, now }) => (
          <li key={name} className="truncate" title={name}>
            {name}: {readWords(before)} → {readWords(now)}
          </li>
        ))}
      </ul>
    </div>
  );
}

function readWords(read: ReadName | null): string {
  return read === null ? 'no match' : `${read.asset}${read.version === null ? '' : ` ${versionLabel(read.version, 1)}`}`;
}

function SampleRow({ name, pattern }: { name: string; pattern: string | null }) {
  const read = readName(name, pattern);
  return (
    <TableRow>
      <TableCell className="max-w-64 truncate pl-0 font-mono text-13 text-ink-2">{name}</TableCell>
      {read === null ? (
        <TableCell colSpan={3} className="text-wrong">
          does not match
        </TableCell>
      ) : (
        <>
          <TableCell className="font-mono text-13">{read.asset}</TableCell>
          <TableCell>{CATEGORY_WORDS[read.category]}</TableCell>
          <TableCell className="font-mono text-13">
            {read.version ?? <span className="font-sans text-ink-3">the next</span>}
          </TableCell>
        </>
      )}
    </TableRow>
  );
}
