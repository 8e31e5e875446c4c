'use client';

import { ArrowDownUp } from 'lucide-react';
import { useRouter } from 'next/navigation';
import { useCallback, useMemo, useRef, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Chip } from '@/components/ui/chip';
import { goesUp, useImportDesk } from '@/hooks/use-import-desk';
import { useOnline } from '@/hooks/use-online';
import { byteWords } from '@/lib/rules/byte-words';
import type { ImportPreparation } from '@/lib/rules/import-answer';
import { readName } from '@/lib/rules/name-pattern';
import { versionLabel } from '@/lib/rules/import-plan';
import { DeskBulk } from './desk-bulk';
import { DESK_FILTERS } from './desk-filters';
import { DeskNames } from './desk-names';
import { DeskSettings } from './desk-settings';
import { DeskTable } from './desk-table';
import { DropZone } from './drop-zone';
import { UnfinishedImports } from './unfinished-imports';

const filesOf = (count: number): string => (count === 1 ? '1 file' : `${count.toLocaleString('en')} files`);

/** From dropped files to a submitted import: names become assets and versions before anything goes up. */
export function ImportDesk({ preparation }: { preparation: ImportPreparation }) {
  const router = useRouter();
  const onSubmitted = useCallback((id: string) => router.push(`/shows/${preparation.show}/imports/${id}`), [preparation.show, router]);
  const desk = useImportDesk(preparation, onSubmitted);
  const isOnline = useOnline();
  const [filter, setFilter] = useState('all');
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const lastChosen = useRef<string | null>(null);
  const { rows, phase } = desk;
  const chosenFilter = DESK_FILTERS.find((one) => one.key === filter) ?? DESK_FILTERS[0];
  const shown = useMemo(() => rows.filter(chosenFilter.holds), [rows, chosenFilter]);
  const choose = useCallback(
    (path: string, isChosen: boolean, reach: boolean) => {
      const at = shown.findIndex((row) => row.path === path);
      const from = reach ? shown.findIndex((row) => row.path === lastChosen.current) : -1;
      const paths = from === -1 ? [path] : shown.slice(Math.min(at, from), Math.max(at, from) + 1).map((row) => row.path);
      lastChosen.current = path;
      setChosen((now) => withPaths(now, paths, isChosen));
    },
    [shown],
  );
  const unfinished = <UnfinishedImports show={preparation.show} imports={desk.unfinished} continued={desk.continued} areFilesHere={rows.length > 0} onDiscard={desk.discard} />;
  const refusal =
    desk.refusal === null ? null : (
      <p role="alert" className="text-13 text-wrong">
        {desk.refusal}
      </p>
    );
  if (rows.length === 0) {
    return (
      <>
        {unfinished}
        <div className="flex flex-col gap-5 p-4 md:p-6">
          {refusal}
          <DropZone limits={preparation} onFiles={desk.add} />
          <NameRule preparation={preparation} />
        </div>
      </>
    );
  }
  const locked = phase === 'sending' || phase === 'submitting';
  const going = rows.filter(goesUp);
  const bytes = going.reduce((sum, row) => sum + row.file.size, 0);
  const chosenRows = rows.filter((row) => chosen.has(row.path));
  const sentBytes = going.reduce((sum, row) => sum + (row.upload?.sentBytes ?? 0), 0);
  const failed = rows.filter((row) => row.upload?.state === 'failed').length;
  return (
    <div className="flex min-h-0 flex-1 flex-col">
      {phase === 'choosing' ? unfinished : null}
      <div className="flex flex-col gap-2 px-4 pt-3 sm:gap-4 sm:pt-4 md:px-6">
        <DropZone limits={preparation} onFiles={desk.add} slim disabled={locked} />
        <DeskSettings
          options={desk.options}
          standard={{ scheme: preparation.scheme, boundary: preparation.boundary, partsBy: preparation.parts_by, weld: false, turnFaces: false }}
          disabled={phase !== 'choosing'}
          onChange={desk.setOptions}
        />
        <DeskNames pattern={desk.pattern} standard={preparation.name_pattern} rows={rows} disabled={phase !== 'choosing'} />
        <div className="flex gap-2 overflow-x-auto pb-3" role="group" aria-label="Show files">
          {DESK_FILTERS.map((one) => ({ ...one, count: rows.filter(one.holds).length }))
            .filter((one) => one.key === 'all' || one.key === chosenFilter.key || one.count > 0)
            .map((one) => (
              <Chip key={one.key} pressed={one.key === chosenFilter.key} count={one.count} onClick={() => setFilter(one.key)}>
                {one.label}
              </Chip>
            ))}
          <Button size="small" look="quiet" className="-mr-2.5 ml-auto shrink-0" onClick={() => desk.setOrder(desk.order === 'path' ? 'attention' : 'path')}>
            <ArrowDownUp aria-hidden />
            {desk.order === 'path' ? 'By path' : 'Needs a look first'}
          </Button>
        </div>
      </div>
      {chosenRows.length === 0 || locked ? null : <DeskBulk rows={chosenRows} onChange={desk.change} onRemove={desk.remove} onDone={() => setChosen(new Set())} />}
      <DeskTable
        rows={shown}
        locked={locked}
        chosen={chosen}
        onChoose={choose}
        onChooseAll={(isChosen) => setChosen((now) => withPaths(now, shown.map((row) => row.path), isChosen))}
        onChange={desk.change}
        onRemove={desk.remove}
      />
      <footer className="sticky bottom-0 flex flex-wrap items-center gap-x-5 gap-y-2 border-t border-rule bg-bench px-4 py-3 md:px-6">
        <div className="min-w-0 flex-1 basis-64">
          {locked ? (
            <SendingWords sent={rows.filter((row) => row.upload?.state === 'sent').length} total={going.length} share={bytes === 0 ? 1 : sentBytes / bytes} isWaiting={!isOnline || going.some((row) => row.upload?.state === 'waiting')} />
          ) : (
            <p className="text-14 text-ink-2">
              {filesOf(going.length)}, {byteWords(bytes)}
              {rows.length > going.length ? `. ${filesOf(rows.length - going.length)} stay here.` : ''}
            </p>
          )}
          {refusal}
          {phase === 'stopped' && failed > 0 ? (
            <p role="alert" className="text-13 text-wrong">
              {filesOf(failed)} did not arrive.
            </p>
          ) : null}
        </div>
        <div className="flex flex-wrap gap-2 max-sm:w-full max-sm:*:flex-1">
          {phase === 'choosing' ? <Button onClick={desk.clear}>Clear the list</Button> : null}
          {phase === 'sending' ? <Button onClick={desk.halt}>Stop sending</Button> : null}
          {phase === 'stopped' ? <Button onClick={() => void desk.giveUp()}>Give up</Button> : null}
          {phase === 'stopped' && rows.some((row) => row.upload?.state === 'sent') ? <Button onClick={() => void desk.submit()}>Go on with what arrived</Button> : null}
          {locked ? null : (
            <Button look="filled" disabled={going.length === 0} onClick={() => void desk.start()}>
              {phase === 'stopped' ? 'Send the rest' : `Import ${filesOf(going.length)}`}
            </Button>
          )}
        </div>
      </footer>
    </div>
  );
}

function withPaths(now: ReadonlySet<string>, paths: readonly string[], isChosen: boolean): ReadonlySet<string> {
  const next = new Set(now);
  for (const path of paths) if (isChosen) next.add(path); else next.delete(path);
  return next;
}

function SendingWords({ sent, total, share, isWaiting }: { sent: number; total: number; share: number; isWaiting: boolean }) {
  return (
    <div className="flex flex-col gap-1.5">
      <p role="status" className="text-14 text-ink-2">
        {sent.toLocaleString('en')} of {filesOf(total)} sent. {isWaiting ? 'No connection. It goes on by itself when there is one.' : 'Stay on this page until all are.'}
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
