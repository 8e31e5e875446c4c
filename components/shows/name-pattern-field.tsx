'use client';

import { useState } from 'react';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { TextArea } from '@/components/ui/text-area';
import { checkNamePattern, readName } from '@/lib/rules/name-pattern';
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
}

/** The show's name pattern, tried on names as they are typed. */
export function NamePatternField({ value, onChange, error, disabled }: NamePatternFieldProps) {
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
