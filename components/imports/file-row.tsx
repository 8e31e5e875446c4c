import { ChevronRight } from 'lucide-react';
import { cn } from '@/components/ui/cn';
import type { ImportFileRow } from '@/lib/rules/import-answer';
import { AssetLink, FindingCounts, OutcomeWords, Size, ToKnow, VersionLink } from './file-cells';
import { FileDetail, hasDetail } from './file-detail';
import { FilePath } from './file-path';
import { FILE_COLUMNS } from './file-columns';

interface FileProps {
  file: ImportFileRow;
  show: string;
  upAxis: 'y' | 'z';
  isOpen: boolean;
  onToggle: () => void;
  top: number;
  index: number;
  /** Tells the list how high the row turned out. */
  measure: (element: HTMLElement | null) => void;
}

/** A file as a row of the table, with all that is to know of it below while it is open. */
export function FileRow({ file, show, upAxis, isOpen, onToggle, top, index, measure }: FileProps) {
  const detailId = `file-${index}`;
  return (
    <div ref={measure} data-index={index} role="row" aria-rowindex={index + 2} className="absolute inset-x-0 border-b border-rule px-4 text-13 md:px-6" style={{ top }}>
      <div className="grid h-12 items-center gap-x-3" role="presentation" style={{ gridTemplateColumns: FILE_COLUMNS }}>
        <div role="cell">
          <Opener file={file} isOpen={isOpen} onToggle={onToggle} controls={detailId} index={index} />
        </div>
        <div role="rowheader" className="min-w-0">
          <FilePath path={file.name} />
        </div>
        <div role="cell">
          <OutcomeWords file={file} />
        </div>
        <div role="cell" className="min-w-0 truncate">
          <AssetLink file={file} show={show} />
        </div>
        <div role="cell" className="truncate">
          <VersionLink file={file} show={show} />
        </div>
        <div role="cell" className="text-right font-mono">{file.unpacked_into ? `${file.unpacked_into} files` : file.parts}</div>
        <div role="cell" className="text-right">
          <FindingCounts file={file} />
        </div>
        <div role="cell" className="pl-4">
          <Size file={file} upAxis={upAxis} />
        </div>
        <div role="cell" className="min-w-0">{isOpen ? null : <ToKnow file={file} />}</div>
      </div>
      {isOpen ? (
        <div id={detailId} role="cell" aria-colspan={9} className="pb-4 pl-8 md:max-w-4xl">
          <FileDetail file={file} show={show} />
        </div>
      ) : null}
    </div>
  );
}

/** The same on a narrow screen. */
export function FileCard({ file, show, upAxis, isOpen, onToggle, top, index, measure }: FileProps) {
  const detailId = `file-${index}`;
  const parts = file.unpacked_into ? `${file.unpacked_into} files` : file.parts === null ? null : file.parts === 1 ? '1 part' : `${file.parts} parts`;
  return (
    <div ref={measure} data-index={index} role="listitem" className="absolute inset-x-0 flex flex-col gap-1.5 border-b border-rule px-4 py-3 text-13" style={{ top }}>
      <div className="flex items-center justify-between gap-3">
        <FilePath path={file.name} />
        <span className="shrink-0">
          <OutcomeWords file={file} />
        </span>
      </div>
      <div className="flex min-w-0 flex-wrap items-center gap-x-3 gap-y-1">
        <span className="min-w-0 truncate">
          <AssetLink file={file} show={show} /> <VersionLink file={file} show={show} />
        </span>
        {parts === null ? null : <span className="text-ink-2">{parts}</span>}
        <FindingCounts file={file} />
        {file.size_m ? (
          <span className="ml-auto flex items-center gap-1.5">
            <Size file={file} upAxis={upAxis} />
            <span className="text-12 text-ink-3">m high</span>
          </span>
        ) : null}
      </div>
      <div className="flex items-start gap-2">
        <div className="min-w-0 flex-1" id={detailId}>
          {isOpen ? <FileDetail file={file} show={show} /> : <ToKnow file={file} />}
        </div>
        <Opener file={file} isOpen={isOpen} onToggle={onToggle} controls={detailId} index={index} />
      </div>
    </div>
  );
}

function Opener({ file, isOpen, onToggle, controls, index }: { file: ImportFileRow; isOpen: boolean; onToggle: () => void; controls: string; index: number }) {
  if (!hasDetail(file)) return null;
  return (
    <button
      type="button"
      data-opener={index}
      aria-expanded={isOpen}
      aria-controls={controls}
      aria-label={`What is to know of ${file.name}`}
      onClick={onToggle}
      className="-ml-1.5 inline-flex size-7 items-center justify-center rounded text-ink-3 hover:bg-raised hover:text-ink pointer-coarse:size-11"
    >
      <ChevronRight aria-hidden className={cn('size-4 transition-transform duration-100 motion-reduce:transition-none', isOpen && 'rotate-90')} />
    </button>
  );
}
