'use client';

import { useId, useState } from 'react';
import { Button } from '@/components/ui/button';
import { cn } from '@/components/ui/cn';
import { Input } from '@/components/ui/input';
import { Select } from '@/components/ui/select';
import { NOTHING_SAID, type Said } from '@/hooks/desk-files';
import type { DeskRow } from '@/hooks/use-import-desk';
import { MAX_ASSET_CODE } from '@/lib/rules/place-names';
import { CATEGORIES, CATEGORY_WORDS } from '@/lib/rules/states';
import { isAssetCode, typedVersion } from './desk-entries';

interface DeskBulkProps {
  rows: readonly DeskRow[];
  onChange: (paths: readonly string[], to: Partial<Said>) => void;
  onRemove: (paths: readonly string[]) => void;
  onDone: () => void;
}

const CATEGORY_OPTIONS = CATEGORIES.map((category) => ({ value: category, label: CATEGORY_WORDS[category] }));

/** Says asset, version and category of all chosen files at once, gives them back to their names, or leaves them out. */
export function DeskBulk({ rows, onChange, onRemove, onDone }: DeskBulkProps) {
  const [asset, setAsset] = useState('');
  const [version, setVersion] = useState('');
  const [isOpen, setIsOpen] = useState(false);
  const id = useId();
  const paths = rows.map((row) => row.path);
  const number = typedVersion(version);
  /** Files whose folder joined the code: they can follow the asset of the bare name instead. */
  const qualified = rows.flatMap((row) => (row.preview?.qualified && row.preview.readName !== null ? [{ path: row.path, name: row.preview.readName }] : []));
  return (
    <section aria-label="Chosen files" className="flex flex-wrap items-center gap-x-4 gap-y-2 border-y border-rule bg-bench px-4 py-2 md:px-6">
      <p role="status" className="text-14">
        {paths.length.toLocaleString('en')} chosen
      </p>
      <div id={id} className={cn('flex flex-wrap items-center gap-x-4 gap-y-2', !isOpen && 'max-sm:hidden')}>
        <form
          className="flex items-center gap-2 max-sm:w-full"
          onSubmit={(event) => {
            event.preventDefault();
            if (isAssetCode(asset)) onChange(paths, { asset: asset.trim() });
          }}
        >
          <Input aria-label="Asset of the chosen files" placeholder="Asset" className="w-36 max-sm:flex-1" value={asset} maxLength={MAX_ASSET_CODE} spellCheck={false} autoComplete="off" onChange={(event) => setAsset(event.target.value)} />
          <Button type="submit" size="small" className="h-8" disabled={!isAssetCode(asset)}>
            Set asset
          </Button>
        </form>
        <form
          className="flex items-center gap-2 max-sm:w-full"
          onSubmit={(event) => {
            event.preventDefault();
            if (number !== undefined && number !== null) onChange(paths, { version: number });
          }}
        >
          <Input aria-label="Version of the chosen files" placeholder="Version" className="w-24 max-sm:flex-1" inputMode="numeric" value={version} autoComplete="off" aria-invalid={number === undefined || undefined} onChange={(event) => setVersion(event.target.value)} />
          <Button type="submit" size="small" className="h-8" disabled={number === undefined || number === null}>
            Set version
          </Button>
        </form>
        <div className="w-36">
          <Select aria-label="Category of the chosen files" placeholder="Set category" options={CATEGORY_OPTIONS} value="" onValueChange={(value) => onChange(paths, { category: CATEGORIES.find((one) => one === value) ?? null })} />
        </div>
        {qualified.length === 0 ? null : (
          <Button size="small" className="h-8" onClick={() => qualified.forEach(({ path, name }) => onChange([path], { asset: name }))}>
            Drop the folder from the code
          </Button>
        )}
      </div>
      <div className="-mr-2.5 ml-auto flex flex-wrap gap-2 max-sm:gap-0">
        <Button size="small" look="quiet" className="sm:hidden" aria-expanded={isOpen} aria-controls={id} onClick={() => setIsOpen(!isOpen)}>
          {isOpen ? 'Close' : 'Say for all'}
        </Button>
        <Button size="small" look="quiet" className={cn(!isOpen && 'max-sm:hidden')} onClick={() => onChange(paths, NOTHING_SAID)}>
          As the names say
        </Button>
        <Button
          size="small"
          look="quiet"
          onClick={() => {
            onRemove(paths);
            onDone();
          }}
        >
          Leave out
        </Button>
        <Button size="small" look="quiet" onClick={onDone}>
          Choose none
        </Button>
      </div>
    </section>
  );
}
