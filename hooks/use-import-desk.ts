'use client';

import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { ImportPreparation } from '@/lib/rules/import-answer';
import { previewImport, type PreviewRow } from '@/lib/rules/import-preview';
import type { BoundaryWord, PartitionWord, SchemeWord } from '@/lib/rules/measure-words';
import type { Category } from '@/lib/rules/states';
import { requestJson, RequestError } from './request-json';
import { useImportUploads, type Upload } from './use-import-uploads';

export interface DeskFile {
  path: string;
  file: File;
  /** What the person said in place of the name; null leaves it to the name. */
  asset: string | null;
  version: number | null;
  category: Category | null;
}

export interface DeskRow {
  desk: DeskFile;
  preview: PreviewRow;
  upload: Upload | null;
}

export interface DeskOptions {
  scheme: SchemeWord;
  boundary: BoundaryWord;
  partsBy: PartitionWord;
  /** Join vertices on open borders that lie on each other; turn faces one way and outwards. Off unless somebody asks. */
  weld: boolean;
  turnFaces: boolean;
}

/** What was dropped and stays here, with the reason. */
export interface LeftOut {
  otherKinds: ReadonlyMap<string, number>;
  tooLarge: readonly string[];
  tooMany: number;
}

export type DeskPhase = 'choosing' | 'sending' | 'stopped' | 'submitting';

const NONE: LeftOut = { otherKinds: new Map(), tooLarge: [], tooMany: 0 };

/** The path of a dropped file inside what was dropped. */
function pathOf(file: File): string {
  const given = 'path' in file && typeof file.path === 'string' ? file.path : '';
  return (given || file.webkitRelativePath || file.name).replace(/^(\.?\/)+/, '').normalize('NFC');
}

const extensionOf = (path: string): string => /\.([^./]+)$/.exec(path)?.[1].toLowerCase() ?? '';

/** What was dropped, over what was there: files that can go up, and why the others cannot. */
function sortOut(dropped: readonly File[], files: readonly DeskFile[], leftOut: LeftOut, limits: ImportPreparation): { files: DeskFile[]; leftOut: LeftOut } {
  const otherKinds = new Map(leftOut.otherKinds);
  const tooLarge = new Set(leftOut.tooLarge);
  const kept = new Map(files.map((file) => [file.path, file]));
  let { tooMany } = leftOut;
  for (const file of dropped) {
    const path = pathOf(file);
    const kind = extensionOf(path);
    if (!limits.extensions.includes(kind)) otherKinds.set(kind, (otherKinds.get(kind) ?? 0) + 1);
    else if (file.size > limits.max_file_bytes) tooLarge.add(path);
    else if (!kept.has(path) && kept.size >= limits.max_files) tooMany++;
    else kept.set(path, { path, file, asset: null, version: null, category: null });
  }
  return { files: [...kept.values()].sort((a, b) => (a.path < b.path ? -1 : 1)), leftOut: { otherKinds, tooLarge: [...tooLarge], tooMany } };
}

const sayOf = (error: unknown, otherwise: string): string => (error instanceof RequestError ? error.message : otherwise);

/** Files on their way into a show: chosen, looked through, sent four at a time, submitted. */
export function useImportDesk(preparation: ImportPreparation, onSubmitted: (importId: string) => void) {
  const [{ files, leftOut }, setChosen] = useState<{ files: DeskFile[]; leftOut: LeftOut }>({ files: [], leftOut: NONE });
  const [options, setOptions] = useState<DeskOptions>({ scheme: preparation.scheme, boundary: preparation.boundary, partsBy: preparation.parts_by, weld: false, turnFaces: false });
  const [phase, setPhase] = useState<DeskPhase>('choosing');
  const [refusal, setRefusal] = useState<string | null>(null);
  const importId = useRef<string | null>(null);
  const imports = `/api/v1/shows/${encodeURIComponent(preparation.show)}/imports`;
  const { uploads, sendAll, halt } = useImportUploads();

  const previews = useMemo(() => {
    const named = files.map((file) => ({ name: file.path, asset: file.asset, version: file.version, category: file.category }));
    return previewImport(named, preparation.name_pattern, preparation.assets);
  }, [files, preparation]);
  const rows: DeskRow[] = files.map((desk, index) => ({ desk, preview: previews[index], upload: uploads.get(desk.path) ?? null }));

  const submit = useCallback(async () => {
    setPhase('submitting');
    try {
      await requestJson(`${imports}/${importId.current}/submit`, { method: 'POST' });
      onSubmitted(importId.current!);
    } catch (error) {
      setRefusal(sayOf(error, 'The import could not be submitted.'));
      setPhase('stopped');
    }
  }, [imports, onSubmitted]);

  /** Sends what is not there yet, then submits; with failures it stops before that. */
  const start = async () => {
    setRefusal(null);
    setPhase('sending');
    try {
      const body = { scheme: options.scheme, boundary: options.boundary, parts_by: options.partsBy, weld: options.weld, turn_faces: options.turnFaces };
      importId.current ??= (await requestJson<{ id: string }>(imports, { method: 'POST', body })).id;
    } catch (error) {
      setRefusal(sayOf(error, 'The import could not be opened.'));
      return setPhase('choosing');
    }
    const base = `${imports}/${importId.current}/files/`;
    const wanted = rows.filter((row) => row.preview.asset !== null).map((row) => ({ path: row.desk.path, file: row.desk.file, url: base + fileAddress(row) }));
    if (await sendAll(wanted)) await submit();
    else setPhase('stopped');
  };

  useEffect(() => {
    if (phase !== 'sending') return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [phase]);

  return {
    rows,
    leftOut,
    options,
    setOptions,
    phase,
    refusal,
    start,
    submit,
    halt,
    add: (dropped: readonly File[]) => setChosen((now) => sortOut(dropped, now.files, now.leftOut, preparation)),
    clear: () => setChosen({ files: [], leftOut: NONE }),
    change: (path: string, to: Partial<DeskFile>) => setChosen((now) => ({ ...now, files: now.files.map((file) => (file.path === path ? { ...file, ...to } : file)) })),
    remove: (path: string) => setChosen((now) => ({ ...now, files: now.files.filter((file) => file.path !== path) })),
  };
}

/** Path and query of a row's file; an asset that the batch decided (by its folder) is decided again by the server. */
function fileAddress({ desk }: DeskRow): string {
  const query = new URLSearchParams();
  if (desk.asset !== null) query.set('asset', desk.asset);
  if (desk.version !== null) query.set('version', String(desk.version));
  if (desk.category !== null) query.set('category', desk.category);
  return `${desk.path.split('/').map(encodeURIComponent).join('/')}${query.size > 0 ? `?${query}` : ''}`;
}
