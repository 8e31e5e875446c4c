'use client';

import { useCallback, useDeferredValue, useEffect, useMemo, useRef, useState } from 'react';
import type { ImportPreparation, OpenImport } from '@/lib/rules/import-answer';
import { summariseArchive, unpackedPath, type ArchivePreview } from '@/lib/rules/archive-preview';
import { previewImport, worthHashing, type PreviewRow } from '@/lib/rules/import-preview';
import type { BoundaryWord, PartitionWord, SchemeWord } from '@/lib/rules/measure-words';
import { checkNamePattern } from '@/lib/rules/name-pattern';
import { holdImport } from './hold-import';
import { joinDropped, NOTHING_SAID, readBeside, whyStaying, type DroppedFile, type Said } from './desk-files';
import { requestJson, RequestError } from './request-json';
import { useContentHashes } from './use-content-hashes';
import { useDroppedArchives } from './use-dropped-archives';
import { useImportUploads, type Upload } from './use-import-uploads';

export interface DeskRow extends DroppedFile {
  said: Said;
  /** Null for a file that stays here, is read beside another, or is unpacked into others. */
  preview: PreviewRow | null;
  /** What a ZIP of several files becomes. */
  archive: ArchivePreview | null;
  /** Why it stays here. */
  stays: string | null;
  /** The mesh that reads it, where it is no asset of its own. */
  beside: string | null;
  upload: Upload | null;
}

/** A file that goes up under its own path, or what comes out of an archive under the path it will have. */
interface Planned extends DroppedFile {
  name: string;
  /** Path inside the archive. */
  entry: string | null;
}

export interface DeskOptions {
  scheme: SchemeWord;
  boundary: BoundaryWord;
  partsBy: PartitionWord;
  /** Join vertices on open borders that lie on each other; turn faces one way and outwards. Off unless somebody asks. */
  weld: boolean;
  turnFaces: boolean;
}

export type DeskPhase = 'choosing' | 'sending' | 'stopped' | 'submitting';
export type DeskOrder = 'attention' | 'path';

const sayOf = (error: unknown, otherwise: string): string => (error instanceof RequestError ? error.message : otherwise);

/** Files on their way into a show: chosen, looked through, sent side by side, submitted. */
export function useImportDesk(preparation: ImportPreparation, onSubmitted: (importId: string) => void) {
  const [files, setFiles] = useState<readonly DroppedFile[]>([]);
  const [said, setSaid] = useState<ReadonlyMap<string, Said>>(new Map());
  const [options, setOptions] = useState<DeskOptions>({ scheme: preparation.scheme, boundary: preparation.boundary, partsBy: preparation.parts_by, weld: false, turnFaces: false });
  /** As it is typed; empty takes the built-in rule. */
  const [typedPattern, setTypedPattern] = useState(preparation.name_pattern ?? '');
  const [order, setOrder] = useState<DeskOrder>('attention');
  const [phase, setPhase] = useState<DeskPhase>('choosing');
  const [refusal, setRefusal] = useState<string | null>(null);
  const importId = useRef<string | null>(null);
  const letGo = useRef<(() => void) | null>(null);
  const [unfinished, setUnfinished] = useState<readonly OpenImport[]>(preparation.open);
  const imports = `/api/v1/shows/${encodeURIComponent(preparation.show)}/imports`;
  const { uploads, sendAll, halt, giveUpUploads } = useImportUploads();

  const typed = useDeferredValue(typedPattern).trim();
  const patternFault = typed === '' ? null : checkNamePattern(typed);
  // While a pattern is half typed the rows stay as the last whole one has them.
  const [pattern, setPattern] = useState(preparation.name_pattern);
  if (patternFault === null && pattern !== (typed === '' ? null : typed)) setPattern(typed === '' ? null : typed);

  const stays = useMemo(() => whyStaying(files, preparation), [files, preparation]);
  const going = useMemo(() => files.filter((_, index) => stays[index] === null), [files, stays]);
  const { assets } = preparation;
  const archives = useDroppedArchives(going, preparation.extensions);
  /** What is planned: the files that go up, and in the place of an archive what comes out of it. */
  const planned = useMemo(
    () =>
      going.flatMap(({ path, file }): Planned[] => {
        const inside = said.get(path)?.asset ? undefined : archives.get(file);
        if (inside === undefined) return [{ path, file, name: path, entry: null }];
        return inside.map((entry) => ({ path, file, name: unpackedPath(path, entry), entry }));
      }),
    [going, archives, said],
  );
  /** As the names alone have it: the order of the rows does not jump while somebody mends them. */
  const named = useMemo(() => previewImport(planned.map(({ name }) => ({ name })), pattern, assets), [planned, pattern, assets]);
  const wanted = useMemo(() => {
    const sizes = planned.map(({ file, entry }) => ({ size: entry === null ? file.size : -1 }));
    return worthHashing(sizes, named, assets).filter((index) => planned[index].entry === null).map((index) => planned[index].file);
  }, [planned, named, assets]);
  const hashes = useContentHashes(wanted);
  const previews = useMemo(() => {
    const dropped = planned.map(({ path, file, name, entry }) => (entry === null ? { name, ...said.get(path), sha256: hashes.get(file) ?? null } : { name, category: said.get(path)?.category ?? null }));
    return previewImport(dropped, pattern, assets, options.partsBy === 'joint' ? null : { ...options, triangles: 'catmark', creasing: 'uniform' });
  }, [planned, said, hashes, pattern, assets, options]);

  const places = useMemo(() => {
    const attentionOf = new Map<string, number>();
    planned.forEach(({ path }, index) => attentionOf.set(path, Math.max(attentionOf.get(path) ?? 0, named[index].attention)));
    const weight = (index: number): number => (stays[index] === null ? (attentionOf.get(files[index].path) ?? 0) : -1);
    const all = files.map((_, index) => index);
    return order === 'path' ? all : all.sort((a, b) => weight(b) - weight(a) || a - b);
  }, [files, planned, named, stays, order]);

  const rows = useMemo(() => {
    const previewOf = new Map<string, PreviewRow>();
    const insideOf = new Map<string, { entry: string; preview: PreviewRow }[]>();
    planned.forEach(({ path, entry }, index) => {
      if (entry === null) return previewOf.set(path, previews[index]);
      const inside = insideOf.get(path);
      const one = { entry, preview: previews[index] };
      return inside ? inside.push(one) : insideOf.set(path, [one]);
    });
    return places.map((index): DeskRow => {
      const { path, file } = files[index];
      const beside = stays[index] === null ? readBeside(path) : null;
      const inside = insideOf.get(path);
      const archive = inside ? summariseArchive(inside.map(({ entry }) => entry), inside.map(({ preview }) => preview)) : null;
      return { path, file, said: said.get(path) ?? NOTHING_SAID, preview: beside === null ? (previewOf.get(path) ?? null) : null, archive, stays: stays[index], beside, upload: uploads.get(path) ?? null };
    });
  }, [files, planned, previews, places, said, stays, uploads]);

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

  const own = pattern === preparation.name_pattern ? null : (pattern ?? '');
  const continued = useMemo(() => {
    const up = new Set(rows.filter(goesUp).map(({ path }) => path));
    return unfinished.find((open) => isContinued(open, options, own, up)) ?? null;
  }, [unfinished, options, own, rows]);

  /** The import that this drop goes into: one that was left unfinished and holds nothing else, or a new one. */
  const openImport = async (): Promise<string> => {
    letGo.current = continued === null ? null : await holdImport(continued.id);
    if (continued !== null && letGo.current !== null) return continued.id;
    const body = { scheme: options.scheme, boundary: options.boundary, parts_by: options.partsBy, weld: options.weld, turn_faces: options.turnFaces };
    const { id } = await requestJson<{ id: string }>(imports, { method: 'POST', body: own === null ? body : { ...body, name_pattern: pattern } });
    letGo.current = await holdImport(id);
    return id;
  };

  /** Sends what is not there yet, then submits; with failures it stops before that. */
  const start = async () => {
    setRefusal(null);
    setPhase('sending');
    try {
      importId.current ??= await openImport();
    } catch (error) {
      setRefusal(sayOf(error, 'The import could not be opened.'));
      return setPhase('choosing');
    }
    const base = `${imports}/${importId.current}/files/`;
    const wantedUploads = rows.filter(goesUp).map((row) => ({ path: row.path, file: row.file, url: base + fileAddress(row) }));
    if (await sendAll(wantedUploads)) await submit();
    else setPhase('stopped');
  };

  useEffect(() => {
    if (phase !== 'sending') return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [phase]);

  useEffect(() => () => letGo.current?.(), []);

  /** Cancels an import that was not submitted; what arrived in it is left out. False, with the reason said, where that failed. */
  const discard = async (id: string): Promise<boolean> => {
    setRefusal(null);
    try {
      await requestJson(`${imports}/${id}/cancel`, { method: 'POST' });
      setUnfinished((now) => now.filter((open) => open.id !== id));
      return true;
    } catch (error) {
      setRefusal(sayOf(error, 'The import could not be discarded.'));
      return false;
    }
  };

  /** Ends what was begun, parts that arrived included, and goes back to the list. */
  const giveUp = async () => {
    const id = importId.current;
    setPhase('submitting');
    await giveUpUploads();
    if (id !== null && !(await discard(id))) return setPhase('stopped');
    letGo.current?.();
    importId.current = null;
    setPhase('choosing');
  };

  const change = useCallback((paths: readonly string[], to: Partial<Said>) => {
    setSaid((now) => {
      const next = new Map(now);
      for (const path of paths) next.set(path, { ...(now.get(path) ?? NOTHING_SAID), ...to });
      return next;
    });
  }, []);
  const remove = useCallback((paths: readonly string[]) => {
    const gone = new Set(paths);
    setFiles((now) => now.filter((file) => !gone.has(file.path)));
  }, []);

  return {
    rows,
    options,
    setOptions,
    pattern: { typed: typedPattern, type: setTypedPattern, fault: patternFault, isOwn: pattern !== preparation.name_pattern },
    order,
    setOrder,
    phase,
    refusal,
    unfinished,
    continued,
    discard,
    start,
    submit,
    halt,
    giveUp,
    change,
    remove,
    add: (dropped: readonly File[]) => setFiles((now) => joinDropped(now, dropped)),
    clear: () => {
      setFiles([]);
      setSaid(new Map());
    },
  };
}

/** Whether a file goes up as things stand: it has an asset, is read beside one, or is unpacked. */
export function goesUp({ preview, archive, beside }: DeskRow): boolean {
  return beside !== null || archive !== null || (preview !== null && preview.asset !== null);
}

/** Whether an import that was left open is the one to go on with: measured the same way, and with no file that is not here. */
function isContinued(open: OpenImport, options: DeskOptions, namePattern: string | null, paths: ReadonlySet<string>): boolean {
  const isAlike = open.scheme === options.scheme && open.boundary === options.boundary && open.parts_by === options.partsBy && open.weld === options.weld && open.turn_faces === options.turnFaces;
  return isAlike && open.standard && open.name_pattern === namePattern && open.names.every((name) => paths.has(name));
}

/** Path and query of a row's file; an asset that the batch decided (by its folder) is decided again by the server. */
function fileAddress({ path, said }: DeskRow): string {
  const query = new URLSearchParams();
  if (said.asset !== null) query.set('asset', said.asset);
  if (said.version !== null) query.set('version', String(said.version));
  if (said.category !== null) query.set('category', said.category);
  return `${path.split('/').map(encodeURIComponent).join('/')}${query.size > 0 ? `?${query}` : ''}`;
}
