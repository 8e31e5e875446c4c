'use client';

import { FileUp } from 'lucide-react';
import { useId, useState } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { TextArea } from '@/components/ui/text-area';
import { useShotPlan } from '@/hooks/use-shot-plan';
import type { Refusal } from '@/hooks/use-act';
import type { ActionResult } from '@/lib/rules/action-result';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import type { ListedShot } from '@/lib/rules/parse-shot-list';
import type { ShotPlan } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';
import { ShotListErrors, ShotPlanTable } from './shot-plan-table';

const MOST_BYTES = 8 * 1024 * 1024;

interface ShotListProps {
  show: string;
  plan: (input: PutShotsInput) => Promise<ActionResult<ShotPlan>>;
  busy: boolean;
  refusal: Refusal | null;
  onAdd: (shots: readonly ListedShot[]) => void;
}

/** Shots as a spreadsheet gives them, with what they would make before they do. */
export function ShotList({ show, plan, busy, refusal, onAdd }: ShotListProps) {
  const [text, setText] = useState('');
  const [fileError, setFileError] = useState<string | null>(null);
  const fileId = useId();
  const { list, planned, errors, reading, failure } = useShotPlan(show, text, plan);
  const changes = planned?.filter((item) => item.fresh || item.adds.length > 0).length ?? 0;
  const ready = planned !== null && errors.length === 0 && changes > 0 && !reading;

  async function take(file: File | undefined) {
    setFileError(null);
    if (file === undefined) return;
    if (file.size > MOST_BYTES) return setFileError(`${file.name} is larger than 8 MiB.`);
    setText(await file.text());
  }

  return (
    <div className="flex flex-col gap-4">
      <Field
        label="Shot list"
        hint="Columns sequence, shot, assets, copies, with tabs, commas or semicolons between; a line of headings is read where there is one."
        error={fileError}
      >
        <TextArea
          value={text}
          rows={6}
          spellCheck={false}
          placeholder={'fer\tfer_0010\ttarnOx\nfer\tfer_0010\tlantern\t3\nfer\tfer_0020\ttarnOx sledge'}
          onChange={(event) => setText(event.target.value)}
          onDrop={(event) => {
            if (event.dataTransfer.files.length === 0) return;
            event.preventDefault();
            void take(event.dataTransfer.files[0]);
          }}
          className="font-mono text-13"
        />
      </Field>
      <div className="flex flex-wrap items-center gap-3">
        <input id={fileId} type="file" accept=".csv,.tsv,.txt,text/csv,text/tab-separated-values" className="peer sr-only" onChange={(event) => void take(event.target.files?.[0]).finally(() => (event.target.value = ''))} />
        <Button asChild size="small" className="peer-focus-visible:outline-2 peer-focus-visible:outline-offset-2 peer-focus-visible:outline-brass">
          <label htmlFor={fileId} className="cursor-pointer">
            <FileUp aria-hidden />
            Choose CSV file
          </label>
        </Button>
        {text === '' ? null : (
          <Button size="small" look="quiet" onClick={() => setText('')}>
            Clear
          </Button>
        )}
        <p role="status" className="text-13 text-ink-2">
          {text.trim() === ''
            ? ''
            : reading
              ? 'Reading the list'
              : errors.length > 0
                ? `${counted(errors.length, 'line')} to mend. Nothing is added before all lines can be read.`
                : planned === null
                  ? ''
                  : changes === 0
                    ? 'All of it is in the show already.'
                    : summary(planned)}
        </p>
      </div>
      {errors.length > 0 ? <ShotListErrors errors={errors} /> : planned !== null && planned.length > 0 ? <ShotPlanTable items={planned} /> : null}
      {failure === null ? null : (
        <p role="alert" className="text-13 text-wrong">
          {failure}
        </p>
      )}
      <ActRefusal refusal={refusal} />
      <div className="flex justify-end">
        <Button look="filled" disabled={!ready || busy} onClick={() => onAdd(list.shots)}>
          {busy ? 'Adding' : ready ? `Add ${counted(changes, 'shot')}` : 'Add shots'}
        </Button>
      </div>
    </div>
  );
}

function summary(items: ShotPlan['items']): string {
  const fresh = items.filter((item) => item.fresh).length;
  const grown = items.filter((item) => !item.fresh && item.adds.length > 0).length;
  const same = items.length - fresh - grown;
  return [fresh > 0 ? `${counted(fresh, 'new shot')}` : '', grown > 0 ? `${counted(grown, 'shot')} with more in ${grown === 1 ? 'it' : 'them'}` : '', same > 0 ? `${same} as they are` : ''].filter(Boolean).join(', ');
}
