'use client';

import { useState } from 'react';
import { cn } from '@/components/ui/cn';
import { Input } from '@/components/ui/input';
import type { Said } from '@/hooks/desk-files';
import type { PreviewRow } from '@/lib/rules/import-preview';
import { MAX_ASSET_CODE } from '@/lib/rules/place-names';

interface EntryProps {
  path: string;
  said: Said;
  preview: PreviewRow;
  locked: boolean;
  onChange: (paths: readonly string[], to: Partial<Said>) => void;
}

/** A code as it may be typed: not empty, no path. */
export const isAssetCode = (text: string): boolean => text.trim() !== '' && !/[/\\]/.test(text);

/** A version as it may be typed: `12`, `012`, `v012`; empty leaves it to the name. Undefined for anything else. */
export function typedVersion(text: string): number | null | undefined {
  const digits = /^v?(\d{0,9})$/i.exec(text.trim())?.[1];
  return digits === undefined ? undefined : digits === '' ? null : Number(digits);
}

/** The asset of a file; what is typed wins over the name, and nothing typed gives it back to the name. */
export function AssetEntry({ path, said, preview, locked, onChange }: EntryProps) {
  const [text, setText] = useState(preview.asset ?? '');
  return (
    <Input
      aria-label={`Asset of ${path}`}
      value={text}
      disabled={locked}
      maxLength={MAX_ASSET_CODE}
      spellCheck={false}
      autoComplete="off"
      aria-invalid={!isAssetCode(text) || undefined}
      className={said.asset === null ? undefined : 'border-brass'}
      onChange={(event) => setText(event.target.value)}
      onBlur={() => {
        const typed = text.trim();
        if (typed === (preview.asset ?? '')) return;
        if (typed === '') onChange([path], { asset: null });
        else if (isAssetCode(typed)) onChange([path], { asset: typed });
      }}
      onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
    />
  );
}

/** The version of a file, as AssetEntry. The number that it gets by itself stands in the field faintly. */
export function VersionEntry({ path, said, preview, locked, onChange }: EntryProps) {
  const shown = preview.version === null ? '' : String(preview.version);
  const [text, setText] = useState(shown);
  return (
    <Input
      aria-label={`Version of ${path}`}
      value={text}
      disabled={locked}
      inputMode="numeric"
      placeholder={preview.label === null ? '' : preview.label.replace(/^v0*(?=\d)/, '')}
      autoComplete="off"
      aria-invalid={typedVersion(text) === undefined || undefined}
      className={cn('text-right', said.version === null ? undefined : 'border-brass')}
      onChange={(event) => setText(event.target.value)}
      onBlur={() => {
        const version = typedVersion(text);
        if (text.trim().replace(/^v/i, '') === shown || version === undefined) return;
        onChange([path], { version });
      }}
      onKeyDown={(event) => event.key === 'Enter' && event.currentTarget.blur()}
    />
  );
}
