'use client';

import { useRouter } from 'next/navigation';
import { useCallback, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Chip } from '@/components/ui/chip';
import { useImportDesk, type DeskRow } from '@/hooks/use-import-desk';
import { byteWords } from '@/lib/rules/byte-words';
import type { ImportPreparation } from '@/lib/rules/import-answer';
import { readName } from '@/lib/rules/name-pattern';
import { versionLabel } from '@/lib/rules/import-plan';
import { DeskSettings } from './desk-settings';
import { DeskTable } from './desk-table';
import { DropZone } from './drop-zone';
import { LeftOutWords } from './left-out-words';

const FILTERS: { key: string; label: string; holds: (row: DeskRow) => boolean }[] = [
  { key: 'all', label: 'All', holds: () => true },
  { key: 'look', label: 'Worth a look', holds: (row) => row.preview.warnings.length > 0 },
  { key: 'new_asset', label: 'New assets', holds: (row) => row.preview.outcome === 'new_asset' },
  { key: 'new_version', label: 'New versions', holds: (row) => row.preview.outcome === 'new_version' },
  { key: 'next_take', label: 'Next takes', holds: (row) => row.preview.outcome === 'next_take' },
  { key: 'unmatched', label: 'No asset', holds: (row) => row.preview.outcome === 'unmatched' },
  { key: 'failed', label: 'Not sent', holds: (row) => row.upload?.state === 'failed' },
];

const filesOf = (count: number): string => (count === 1 ? '1 file' : `${count.toLocaleString('en')} files`);

/** From dropped files to a submitted import: names become assets and versions before anything goes up. */
export function ImportDesk({ preparation }: { preparation: ImportPreparation }) {
  const router = useRouter();
  const onSubmitted = useCallback((id: string) => router.push(`/shows/${preparation.show}/imports/${id}`), [preparation.show, router]);
  const desk = useImportDesk(preparation, onSubmitted);
  const [filter, setFilter] = useState('all');
  const { rows, phase } = desk;
  if (rows.length === 0) {
    return (
      <div className="flex flex-col gap-5 p-4 md:p-6">
        <DropZone limits={preparation} onFiles={desk.add} />
        <LeftOutWords leftOut={desk.leftOut} />
        <NameRule preparation={preparation} />
      </div>
    );
  }
  const locked = phase === 'sending' || phase === 'submitting';
  const chosen = FILTERS.find((one) => one.key === filter) ?? FILTERS[0];
  const going = rows.filter((row) => row.preview.asset !== null);
  const bytes = going.reduce((sum, row) => sum + row.desk.file.size, 0);
  const sentBytes = going.reduce((sum, row) => sum + (row.upload?.sentBytes ?? 0), 0);
  const failed = rows.filter((row) => row.upload?.state === 'failed').length;
  return (
    <div className="flex min-h-0 flex-1 flex-col">
      <div className="flex flex-col gap-4 px-4 pt-4 md:px-6">
        <DropZone limits={preparation} onFiles={desk.add} slim disabled={locked} />
        <LeftOutWords leftOut={desk.leftOut} />
        <DeskSettings
          options={desk.options}
          standard={{ scheme: preparation.scheme, boundary: preparation.boundary, partsBy: preparation.parts_by, weld: false, turnFaces: false }}
          disabled={phase !== 'choosing'}
          onChange={desk.setOptions}
        />
        <div className="flex gap-2 overflow-x-auto pb-3" role="group" aria-label="Show files">
          {FILTERS.map((one) => ({ ...one, count: rows.filter(one.holds).length }))
            .filter((one) => one.key === 'all' || one.count > 0)
            .map((one) => (
              <Chip key={one.key} pressed={one === chosen || one.key === chosen.key} count={one.count} onClick={() => setFilter(one.key)}>
                {one.label}
              </Chip>
            ))}
        </div>
      </div>
      <DeskTable rows={rows.filter(chosen.holds)} locked={locked} onChange={desk.change} onRemove={desk.remove} />
      <footer className="sticky bottom-0 flex flex-wrap items-center gap-x-5 gap-y-2 border-t border-rule bg-bench px-4 py-3 md:px-6">
        <div className="min-w-0 flex-1 basis-64">
          {locked ? (
            <SendingWords sent={rows.filter((row) => row.upload?.state === 'sent').length} total={going.length} share={bytes === 0 ? 1 : sentBytes / bytes} />
          ) : (
            <p className="text-14 text-ink-2">
              {filesOf(going.length)}, {byteWords(bytes)}
              {rows.length > going.length ? `. ${filesOf(rows.length - going.length)} without an asset stay here.` : ''}
            </p>
          )}
          {desk.refusal === null ? null : (
            <p role="alert" className="text-13 text-wrong">
              {desk.refusal}
            </p>
          )}
          {phase === 'stopped' && failed > 0 ? (
            <p role="alert" className="text-13 text-wrong">
              {filesOf(failed)} did not arrive.
            </p>
          ) : null}
        </div>
        <div className="flex flex-wrap gap-2">
          {phase === 'choosing' ? <Button look="quiet" onClick={desk.clear}>Clear the list</Button> : null}
          {phase === 'sending' ? <Button onClick={desk.halt}>Stop sending</Button> : null}
          {phase === 'stopped' && rows.some((row) => row.upload?.state === 'sent') ? <Button onClick={() => void desk.submit()}>Go on with what arrived</Button> : null}
          <Button look="filled" disabled={locked || going.length === 0} onClick={() => void desk.start()}>
            {phase === 'stopped' ? 'Send the rest' : `Import ${filesOf(going.length)}`}
          </Button>
        </div>
      </footer>
    </div>
  );
}

function SendingWords({ sent, total, share }: { sent: number; total: number; share: number }) {
  return (
    <div className="flex flex-col gap-1.5">
      <p role="status" className="text-14 text-ink-2">
        {sent.toLocaleString('en')} of {filesOf(total)} sent. Stay on this page until all are.
      </p>
      <div aria-hidden className="h-1 max-w-md bg-rule">
        <div className="h-full bg-brass" style={{ width: `${Math.min(1, share) * 100}%` }} />
      </div>
    </div>
  );
}

const EXAMPLE = 'creatures/ox_v012.obj';

/** How names are read here, with one name read. */
function NameRule({ preparation }: { preparation: ImportPreparation }) {
  const read = readName(EXAMPLE, preparation.name_pattern);
  return (
    <dl className="grid max-w-3xl grid-cols-[max-content_1fr] gap-x-6 gap-y-1.5 text-13">
      <dt className="text-ink-3">Units</dt>
      <dd className="text-ink-2">
        {preparation.linear_unit}, {preparation.up_axis} up{preparation.frozen ? '' : '. They are fixed by the first import.'}
      </dd>
      <dt className="text-ink-3">Names</dt>
      <dd className="text-ink-2">{preparation.name_pattern === null ? 'version token and folder' : <code className="font-mono">{preparation.name_pattern}</code>}</dd>
      <dt className="text-ink-3">Example</dt>
      <dd className="text-ink-2">
        <code className="font-mono">{EXAMPLE}</code>{' '}
        {read === null ? 'does not match' : `is ${read.asset}, ${read.version === null ? 'next number' : versionLabel(read.version, 1)}, ${read.category}`}
      </dd>
    </dl>
  );
}
