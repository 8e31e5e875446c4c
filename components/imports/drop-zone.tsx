'use client';

import { FolderOpen, Upload } from 'lucide-react';
import { useRef } from 'react';
import { useDropzone } from 'react-dropzone';
import { Button } from '@/components/ui/button';
import { cn } from '@/components/ui/cn';
import { byteWords } from '@/lib/rules/byte-words';
import type { ImportPreparation } from '@/lib/rules/import-answer';

interface DropZoneProps {
  limits: Pick<ImportPreparation, 'extensions' | 'max_file_bytes' | 'max_files' | 'max_import_bytes' | 'left_bytes'>;
  onFiles: (files: readonly File[]) => void;
  /** A strip above the table instead of a whole page. */
  slim?: boolean;
  disabled?: boolean;
}

/** Attribute names that React's types do not know. */
const FOLDER_PICKER: object = { webkitdirectory: '' };

/** Takes files and whole folders, dropped or chosen. Says all limits before anything goes up. */
export function DropZone({ limits, onFiles, slim = false, disabled = false }: DropZoneProps) {
  const { getRootProps, getInputProps, isDragActive, isProcessing, open } = useDropzone({ onDrop: (files) => onFiles(files), noClick: true, noKeyboard: true, disabled });
  const folder = useRef<HTMLInputElement>(null);
  const kinds = limits.extensions.map((extension) => extension.toUpperCase()).join(', ');
  const buttons = (
    <div className={cn('flex flex-wrap gap-2', slim && 'max-sm:w-full max-sm:*:flex-1')}>
      <Button onClick={open} disabled={disabled}>
        <Upload aria-hidden />
        Choose files
      </Button>
      <Button onClick={() => folder.current?.click()} disabled={disabled}>
        <FolderOpen aria-hidden />
        Choose a folder
      </Button>
    </div>
  );
  return (
    <section
      {...getRootProps({ 'aria-label': 'Files to import' })}
      className={cn(
        'rounded border border-dashed transition-colors duration-100',
        isDragActive ? 'border-brass bg-selected' : 'border-edge',
        slim ? 'flex flex-wrap items-center gap-x-5 gap-y-2 max-sm:border-none sm:px-4 sm:py-2.5' : 'flex min-h-72 flex-col items-start justify-center gap-4 px-6 py-12 md:px-12',
      )}
    >
      <div hidden>
        <input {...getInputProps({ 'aria-label': 'Files' })} />
        <input
          ref={folder}
          type="file"
          multiple
          aria-label="Folder"
          {...FOLDER_PICKER}
          onChange={(event) => {
            onFiles([...(event.target.files ?? [])]);
            event.target.value = '';
          }}
        />
      </div>
      <div className={slim ? 'min-w-0 flex-1 basis-60 max-sm:hidden' : 'max-w-xl'}>
        <p className={slim ? 'text-14' : 'text-22 font-medium'}>{isProcessing ? 'Reading the folder…' : isDragActive ? 'Let go to look at them' : slim ? 'Drop more files or folders' : 'Drop cages, or a folder of them'}</p>
        <p className={cn('text-ink-2', slim ? 'text-13' : 'mt-2 text-14')}>
          {kinds}, up to {byteWords(limits.max_file_bytes)} a file, {limits.max_files.toLocaleString('en')} files and {byteWords(limits.max_import_bytes)} an import. There is room for {byteWords(limits.left_bytes)}.
          {slim ? null : ' Nothing goes up before you have seen where each file goes.'}
        </p>
      </div>
      {buttons}
    </section>
  );
}
