'use client';

import { useState, type ReactNode, type SubmitEvent } from 'react';
import { Button } from '@/components/ui/button';
import { Checkbox } from '@/components/ui/checkbox';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { Select } from '@/components/ui/select';
import type { RowChange } from '@/hooks/use-set-values';
import type { PartRow } from '@/lib/rules/part-row';
import type { MaterialOption, ShowFrame } from '@/lib/rules/show-frame';
import { CONSTRUCTIONS, MASS_SOURCES } from '@/lib/rules/states';
import { readForm, startForm, type FormReading, type ValueForm as Form } from '@/lib/rules/value-form';
import { MaterialList } from './material-list';

const SOURCE_LABELS = {
  target_mass: 'Target mass',
  density: 'Density',
  material: 'Material',
  areal_density: 'Weight per area',
};
const HINTS = {
  target_mass: 'kg, or with its unit: 640 kg, 85 g. The density follows.',
  density: 'kg/m3, or with its unit: 7.85 g/cm3.',
  areal_density: 'kg/m2, or with its unit: 300 g/m2. For sheets.',
};

interface ValueFormProps {
  rows: readonly PartRow[];
  frame: ShowFrame;
  materials: readonly MaterialOption[];
  busy: boolean;
  onSet: (changes: RowChange[]) => void;
  /** For an override of one shot: nothing is left out there. */
  forShot?: boolean;
  /** What the caller asks beside the value, above the buttons. */
  children?: ReactNode;
}

/** Mass, construction and whether a part counts, for one row or many at once. */
export function ValueForm({ rows, frame, materials, busy, onSet, forShot = false, children }: ValueFormProps) {
  const [form, setForm] = useState<Form>(() => startForm(rows, frame.linear_unit));
  const [refusal, setRefusal] = useState<Extract<FormReading, { ok: false }> | null>(null);
  const change = (part: Partial<Form>) => {
    setForm((now) => ({ ...now, ...part }));
    setRefusal(null);
  };
  const errorAt = (field: 'amount' | 'material' | 'wall') => (refusal?.field === field ? refusal.message : null);
  const allLeftOut = rows.length > 0 && rows.every((row) => row.state === 'left_out');

  function submit(event: SubmitEvent<HTMLFormElement>) {
    event.preventDefault();
    const reading = readForm(form, rows, frame.linear_unit);
    if (!reading.ok) return setRefusal(reading);
    onSet(rows.map((row, index) => ({ row, change: reading.changes[index] })));
  }

  return (
    <form onSubmit={submit} className="flex flex-col gap-4" noValidate>
      <Field label="Mass from">
        <Select
          value={form.source}
          onValueChange={(source) => change({ source: source as Form['source'], amount: '' })}
          options={[
            ...MASS_SOURCES.map((source) => ({ value: source, label: SOURCE_LABELS[source] })),
            { value: 'as_it_is', label: 'As it is' },
            { value: 'none', label: 'None' },
          ]}
        />
      </Field>
      {form.source === 'target_mass' || form.source === 'density' || form.source === 'areal_density' ? (
        <Field label={SOURCE_LABELS[form.source]} hint={HINTS[form.source]} error={errorAt('amount')}>
          <Input
            value={form.amount}
            autoComplete="off"
            spellCheck={false}
            autoFocus
            onChange={(event) => change({ amount: event.target.value })}
            className="font-mono"
          />
        </Field>
      ) : null}
      {form.source === 'target_mass' && rows.length > 1 ? (
        <label className="flex items-center gap-2 text-14">
          <Checkbox checked={form.shared} onCheckedChange={(checked) => change({ shared: checked === true })} />
          One mass for all of them, shared by volume
        </label>
      ) : null}
      {form.source === 'material' ? (
        <div className="flex flex-col gap-1">
          <MaterialList materials={materials} value={form.material} onChoose={(material) => change({ material })} />
          {errorAt('material') === null ? null : (
            <p role="alert" className="text-13 text-wrong">
              {errorAt('material')}
            </p>
          )}
        </div>
      ) : null}
      <div className="grid grid-cols-2 gap-3">
        <Field label="Construction">
          <Select
            value={form.construction}
            onValueChange={(construction) => change({ construction: construction as Form['construction'] })}
            options={[
              ...CONSTRUCTIONS.map((one) => ({ value: one, label: one })),
              { value: 'as_it_is', label: 'as it is' },
            ]}
          />
        </Field>
        {form.construction === 'hollow' || form.construction === 'sheet' ? (
          <Field label="Wall thickness" unit={frame.linear_unit} error={errorAt('wall')}>
            <Input
              value={form.wall}
              inputMode="decimal"
              autoComplete="off"
              onChange={(event) => change({ wall: event.target.value })}
              className="font-mono"
            />
          </Field>
        ) : null}
      </div>
      {children}
      <div className="flex items-center justify-between gap-2 border-t border-rule pt-4">
        {forShot ? (
          <span />
        ) : (
          <Button
            look="quiet"
            disabled={busy}
            onClick={() => onSet(rows.map((row) => ({ row, change: { left_out: !allLeftOut } })))}
          >
            {allLeftOut ? 'Take in' : 'Leave out'}
          </Button>
        )}
        <Button type="submit" look="filled" disabled={busy}>
          {forShot ? 'Draft override' : rows.length === 1 ? 'Set' : `Set ${rows.length.toLocaleString('en')} parts`}
        </Button>
      </div>
    </form>
  );
}
