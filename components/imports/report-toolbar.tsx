'use client';

import { Search } from 'lucide-react';
import { useEffect, useState } from 'react';
import { Chip } from '@/components/ui/chip';
import { Input } from '@/components/ui/input';
import type { FileQuery } from '@/hooks/use-import-files';
import { FILE_FILTERS, type FileFilter, type FileFilterCounts } from '@/lib/rules/import-answer';

const FILTER_WORDS: Record<FileFilter, string> = { all: 'All', failed: 'Failed', problems: 'With problems', warnings: 'With warnings', going: 'Not ended', unchanged: 'Unchanged' };

const SEARCH_AFTER_MS = 250;

interface ReportToolbarProps {
  filters: FileQuery;
  onChange: (change: { only?: FileFilter | null; q?: string | null }) => void;
  counts: FileFilterCounts;
  /** Files that filter and search let through. */
  found: number;
}

/** Find and filter the files; both go into the address. */
export function ReportToolbar({ filters, onChange, counts, found }: ReportToolbarProps) {
  const [text, setText] = useState(filters.q);
  const [known, setKnown] = useState(filters.q);
  if (known !== filters.q) {
    setKnown(filters.q);
    setText(filters.q);
  }
  useEffect(() => {
    if (text.trim() === filters.q) return;
    const timer = setTimeout(() => onChange({ q: text.trim() === '' ? null : text.trim() }), SEARCH_AFTER_MS);
    return () => clearTimeout(timer);
  }, [text, filters.q, onChange]);
  return (
    <div role="search" aria-label="Files" className="flex items-center gap-x-4 gap-y-2 border-b border-rule bg-bench px-4 py-1.5 max-md:flex-wrap md:px-6">
      <div className="relative w-full md:w-64">
        <Search aria-hidden className="pointer-events-none absolute top-1/2 left-2.5 size-4 -translate-y-1/2 text-ink-3" />
        <Input type="search" aria-label="Find a file or an asset" placeholder="File or asset" value={text} maxLength={200} onChange={(event) => setText(event.target.value)} className="pl-8" />
      </div>
      <div className="flex min-w-0 gap-2 overflow-x-auto py-0.5" role="group" aria-label="Show files">
        {FILE_FILTERS.filter((key) => key === 'all' || key === filters.only || counts[key] > 0).map((key) => (
          <Chip key={key} pressed={key === filters.only} count={counts[key]} onClick={() => onChange({ only: key === 'all' ? null : key })}>
            {FILTER_WORDS[key]}
          </Chip>
        ))}
      </div>
      {filters.q === '' ? null : <p className="shrink-0 text-13 text-ink-3 md:ml-auto">{found === 1 ? '1 file' : `${found.toLocaleString('en')} files`}</p>}
    </div>
  );
}
