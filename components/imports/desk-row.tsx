'use client';

import { X } from 'lucide-react';
import { memo, useState } from 'react';
import { cn } from '@/components/ui/cn';
import { IconButton } from '@/components/ui/icon-button';
import { Input } from '@/components/ui/input';
import { Select } from '@/components/ui/select';
import type { DeskFile, DeskRow as Row } from '@/hooks/use-import-desk';
import { byteWords } from '@/lib/rules/byte-words';
import type { Outcome } from '@/lib/rules/import-preview';
import { MAX_ASSET_CODE } from '@/lib/rules/place-names';
import { CATEGORIES, CATEGORY_WORDS } from '@/lib/rules/states';
import { FilePath } from './file-path';
import { UploadBar } from './upload-bar';

export const DESK_COLUMNS = 'minmax(13rem,1.5fr) minmax(8rem,1fr) 5.5rem 8rem minmax(13rem,1.6fr) 5rem 2.5rem';
export const DESK_ROW_HEIGHT = 44;
export const DESK_CARD_HEIGHT = 148;

const OUTCOME_WORDS: Record<Outcome, string> = {
  new_asset: 'new asset',
  new_version: 'new version',
  next_take: 'unchanged, or next take',
  unchanged: 'unchanged',
  unmatched: 'no asset',
};

const CATEGORY_OPTIONS = CATEGORIES.map((category) => ({ value: category, label: CATEGORY_WORDS[category] }));

interface DeskRowProps {
  row: Row;
  top: number;
  index: number;
  compact: boolean;
  locked: boolean;
  onChange: (path: string, to: Partial<DeskFile>) => void;
  onRemove: (path: string) => void;
}

/** One file: where it comes from, where it goes, and what deserves a look. Asset and version can be said here. */
export const DeskRow = memo(function DeskRow({ row, top, index, compact, locked, onChange, onRemove }: DeskRowProps) {
  const { desk, preview, upload } = row;
  const path = <FilePath path={desk.path} />;
  const asset = <AssetEntry key={`${desk.asset}|${preview.asset}`} row={row} locked={locked} onChange={onChange} />;
  const version = <VersionEntry key={`${desk.version}|${preview.label}`} row={row} locked={locked} onChange={onChange} />;
  const category =
    preview.outcome === 'new_asset' ? (
      <Select
        aria-label={`Category of ${preview.asset}`}
        options={CATEGORY_OPTIONS}
        value={preview.category}
        disabled={locked}
        onValueChange={(value) => onChange(desk.path, { category: CATEGORIES.find((one) => one === value) ?? null })}
      />
    ) : (
      <span className="px-2.5 text-13 text-ink-3">{preview.asset === null ? '' : 'as it is'}</span>
    );
  const outcome = upload ? <UploadBar upload={upload} bytes={desk.file.size} /> : <OutcomeWords row={row} />;
  const remove = (
    <IconButton label={`Leave out ${desk.path}`} disabled={locked} onClick={() => onRemove(desk.path)}>
      <X aria-hidden />
    </IconButton>
  );
  if (compact) {
    return (
      <div role="listitem" className="absolute inset-x-0 border-b border-rule px-4 py-2" style={{ top, height: DESK_CARD_HEIGHT }}>
        <div className="flex items-center gap-2">
          <div className="min-w-0 flex-1">{path}</div>
          {remove}
        </div>
        <div className="grid grid-cols-[1fr_5rem_7rem] gap-2">
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
      className="absolute inset-x-0 grid items-center gap-x-3 border-b border-rule px-4 md:px-6"
      style={{ top, height: DESK_ROW_HEIGHT, gridTemplateColumns: DESK_COLUMNS }}
    >
      <div role="rowheader" className="min-w-0">{path}</div>
      <div role="cell">{asset}</div>
      <div role="cell">{version}</div>
      <div role="cell">{category}</div>
      <div role="cell" className="min-w-0">{outcome}</div>
      <div role="cell" className="text-right text-13 text-ink-2">{byteWords(desk.file.size)}</div>
      <div role="cell">{remove}</div>
    </div>
  );
});

function OutcomeWords({ row: { preview } }: { row: Row }) {
  const words = preview.outcome === 'unmatched' ? OUTCOME_WORDS.unmatched : `${OUTCOME_WORDS[preview.outcome]} · ${preview.label}`;
  const warning = preview.warnings.join(' ');
  return (
    <div className="min-w-0 text-13" title={warning || undefined}>
      <p className={cn(preview.outcome === 'unmatched' ? 'text-wrong' : preview.warnings.length > 0 ? 'text-ink' : 'text-ink-2')}>{words}</p>
      {warning === '' ? null : <p className="truncate text-12 text-ink-2">{warning}</p>}
    </div>
  );
}

interface EntryProps {
  row: Row;
  locked: boolean;
  onChange: DeskRowProps['onChange'];
}

function AssetEntry({ row: { desk, preview }, locked, onChange }: EntryProps) {
  const [text, setText] = useState(preview.asset ?? '');
  const isBad = text.trim() === '' || /[/\\]/.test(text);
  return (
    <Input
      aria-label={`Asset of ${desk.path}`}
      value={text}
      disabled={locked}
      maxLength={MAX_ASSET_CODE}
      spellCheck={false}
      autoComplete="off"
      aria-invalid={isBad || undefined}
      className={desk.asset === null ? undefined : 'border-brass'}
      onChange={(event) => setText(event.target.value)}
      onBlur={() => {
        const said = text.trim();
        if (said === (preview.asset ?? '')) return;
        if (/[/\\]/.test(said)) return;
        onChange(desk.path, { asset: said === '' ? null : said });
      }}
      onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
    />
  );
}

function VersionEntry({ row: { desk, preview }, locked, onChange }: EntryProps) {
  const shown = preview.version === null ? '' : String(preview.version);
  const [text, setText] = useState(shown);
  return (
    <Input
      aria-label={`Version of ${desk.path}`}
      value={text}
      disabled={locked}
      inputMode="numeric"
      placeholder={preview.label === null ? '' : preview.label.replace(/^v0*(?=\d)/, '')}
      autoComplete="off"
      aria-invalid={!/^v?\d{0,9}$/i.test(text.trim()) || undefined}
      className={cn('text-right', desk.version === null ? undefined : 'border-brass')}
      onChange={(event) => setText(event.target.value)}
      onBlur={() => {
        const said = text.trim().replace(/^v/i, '');
        if (said === shown || !/^\d{0,9}$/.test(said)) return;
        onChange(desk.path, { version: said === '' ? null : Number(said) });
      }}
      onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
    />
  );
}
