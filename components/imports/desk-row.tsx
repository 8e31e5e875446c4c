'use client';

import { CircleX, TriangleAlert, X } from 'lucide-react';
import { memo } from 'react';
import { Checkbox } from '@/components/ui/checkbox';
import { cn } from '@/components/ui/cn';
import { IconButton } from '@/components/ui/icon-button';
import { Select } from '@/components/ui/select';
import type { Said } from '@/hooks/desk-files';
import type { DeskRow as Row } from '@/hooks/use-import-desk';
import { byteWords } from '@/lib/rules/byte-words';
import type { ArchivePreview } from '@/lib/rules/archive-preview';
import { OUTCOMES, type Attention, type Outcome } from '@/lib/rules/import-preview';
import { CATEGORIES, CATEGORY_WORDS } from '@/lib/rules/states';
import { AssetEntry, VersionEntry } from './desk-entries';
import { FilePath } from './file-path';
import { UploadBar } from './upload-bar';

export const DESK_COLUMNS = '1.25rem minmax(12rem,1.5fr) minmax(8rem,1fr) 5.5rem 8rem minmax(14rem,1.7fr) 4.5rem 2.5rem';
export const DESK_ROW_HEIGHT = 44;
export const DESK_CARD_HEIGHT = 152;

const OUTCOME_WORDS: Record<Outcome, string> = {
  new_asset: 'new asset',
  new_version: 'new version',
  next_take: 'next take',
  unchanged: 'unchanged',
  unmatched: 'no asset',
};

const CATEGORY_OPTIONS = CATEGORIES.map((category) => ({ value: category, label: CATEGORY_WORDS[category] }));

export interface DeskRowProps {
  row: Row;
  top: number;
  index: number;
  compact: boolean;
  locked: boolean;
  chosen: boolean;
  /** `reach` takes along the rows since the last choice. */
  onChoose: (path: string, chosen: boolean, reach: boolean) => void;
  onChange: (paths: readonly string[], to: Partial<Said>) => void;
  onRemove: (paths: readonly string[]) => void;
}

/** One file: where it comes from, where it goes, and what deserves a look. Asset and version can be said here. */
export const DeskRow = memo(function DeskRow({ row, top, index, compact, locked, chosen, onChoose, onChange, onRemove }: DeskRowProps) {
  const { path: name, file, said, preview, upload } = row;
  const path = <FilePath path={name} />;
  const asset = preview ? <AssetEntry key={`${said.asset}|${preview.asset}`} path={name} said={said} preview={preview} locked={locked} onChange={onChange} /> : null;
  const version = preview ? <VersionEntry key={`${said.version}|${preview.label}`} path={name} said={said} preview={preview} locked={locked} onChange={onChange} /> : null;
  const category =
    preview?.outcome === 'new_asset' ? (
      <Select
        aria-label={`Category of ${preview.asset}`}
        options={CATEGORY_OPTIONS}
        value={preview.category}
        disabled={locked}
        className={cn(said.category !== null && 'border-brass', preview.categoryGuessed && 'text-ink-3')}
        onValueChange={(value) => onChange([name], { category: CATEGORIES.find((one) => one === value) ?? null })}
      />
    ) : (
      <span className="px-2.5 text-13 text-ink-3">{preview?.asset ? CATEGORY_WORDS[preview.category] : ''}</span>
    );
  const outcome = upload ? <UploadBar upload={upload} bytes={file.size} /> : <OutcomeWords row={row} />;
  const choose = (
    <Checkbox
      aria-label={`Choose ${name}`}
      checked={chosen}
      disabled={locked}
      onClick={(event) => {
        event.preventDefault();
        onChoose(name, !chosen, event.shiftKey);
      }}
    />
  );
  const remove = (
    <IconButton label={`Leave out ${name}`} disabled={locked} onClick={() => onRemove([name])}>
      <X aria-hidden />
    </IconButton>
  );
  if (compact) {
    return (
      <div role="listitem" className={cn('absolute inset-x-0 border-b border-rule px-4 py-2', chosen && 'bg-selected')} style={{ top, height: DESK_CARD_HEIGHT }}>
        <div className="flex items-center gap-3">
          {choose}
          <div className="min-w-0 flex-1">{path}</div>
          {remove}
        </div>
        <div className="grid grid-cols-[1fr_5rem_7rem] items-center gap-2">
          {asset}
          {version}
          {category}
        </div>
        <div className="mt-1.5">{outcome}</div>
      </div>
    );
  }
  return (
    <div
      role="row"
      aria-rowindex={index + 2}
      className={cn('absolute inset-x-0 grid items-center gap-x-3 border-b border-rule px-4 md:px-6', chosen && 'bg-selected')}
      style={{ top, height: DESK_ROW_HEIGHT, gridTemplateColumns: DESK_COLUMNS }}
    >
      <div role="cell">{choose}</div>
      <div role="rowheader" className="min-w-0">{path}</div>
      <div role="cell">{asset}</div>
      <div role="cell">{version}</div>
      <div role="cell">{category}</div>
      <div role="cell" className="min-w-0">{outcome}</div>
      <div role="cell" className="text-right text-13 text-ink-2">{byteWords(file.size)}</div>
      <div role="cell">{remove}</div>
    </div>
  );
});

function OutcomeWords({ row: { preview, archive, stays, beside } }: { row: Row }) {
  if (archive) return <Marked attention={archive.attention} words={`unpacked · ${archive.files} files`} more={archiveWords(archive)} whole={[archiveWords(archive), ...archive.warnings.map(({ entry, words }) => `${entry}: ${words}`)].join('\n')} />;
  if (!preview) {
    const [words, why] = stays === null ? [`read with ${beside}`, ''] : ['stays here', stays];
    return <Words words={words} more={why} quiet />;
  }
  const { outcome, label, attention, categoryGuessed, warnings, notes } = preview;
  const words = [OUTCOME_WORDS[outcome], outcome === 'unmatched' ? null : label, categoryGuessed ? 'category guessed' : null].filter(Boolean).join(' · ');
  return <Marked attention={attention} words={words} more={[...warnings, ...notes].join(' ')} />;
}

const ARCHIVE_WORDS: Record<Outcome, (count: number) => string> = {
  new_asset: (count) => (count === 1 ? '1 new asset' : `${count} new assets`),
  new_version: (count) => (count === 1 ? '1 new version' : `${count} new versions`),
  next_take: (count) => (count === 1 ? '1 next take' : `${count} next takes`),
  unchanged: (count) => `${count} unchanged`,
  unmatched: (count) => `${count} without an asset`,
};

/** What comes out of an archive, and of how many there is more to know. */
function archiveWords({ outcomes, warnings }: ArchivePreview): string {
  const counts = OUTCOMES.flatMap((outcome) => (outcomes.has(outcome) ? [ARCHIVE_WORDS[outcome](outcomes.get(outcome)!)] : []));
  const first = warnings.at(0);
  const more = first === undefined ? '' : warnings.length === 1 ? ` ${first.words}` : ` ${warnings.length} need a look.`;
  return `${counts.join(', ')}.${more}`;
}

function Marked({ attention, words, more, whole }: { attention: Attention; words: string; more: string; whole?: string }) {
  const Mark = attention === 2 ? CircleX : TriangleAlert;
  return (
    <div className="flex min-w-0 items-start gap-2">
      {attention === 0 ? null : <Mark aria-label={attention === 2 ? 'Decide' : 'Look'} className={cn('mt-0.5 size-3.5 shrink-0', attention === 2 ? 'text-wrong' : 'text-ink-2')} />}
      <Words words={words} more={more} whole={whole} quiet={attention === 0} wrong={attention === 2} />
    </div>
  );
}

/** `whole` is all there is to say where `more` is a part of it. */
function Words({ words, more, whole = more, quiet = false, wrong = false }: { words: string; more: string; whole?: string; quiet?: boolean; wrong?: boolean }) {
  return (
    <div className="min-w-0 text-13" title={whole || undefined}>
      <p className={cn('truncate', wrong ? 'text-wrong' : quiet ? 'text-ink-2' : 'text-ink')}>{words}</p>
      {more === '' ? null : <p className={cn('truncate text-12', quiet ? 'text-ink-3' : 'text-ink-2')}>{more}</p>}
    </div>
  );
}
