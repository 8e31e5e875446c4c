import { randomUUID } from 'node:crypto';
import type { Database, Transaction } from '@/db/client';
import type { Actor } from '@/lib/context';
import type { MeasuredCage, MeasureOptions } from '@/lib/engine/measured';
import { MeshError } from '@/lib/formats/mesh-error';
import { recordEvent } from '@/lib/history/record-event';
import type { EnginePool } from '@/lib/jobs/engine-pool';
import { log } from '@/lib/log';
import type { ImportFileError } from '@/lib/rules/import-answer';
import type { PlannedFile } from '@/lib/rules/import-plan';
import { refreshAssetValues } from '@/lib/values/refresh-asset-values';
import { endFile, lockHeldFile } from './end-file';
import { findReusableRecord } from './find-reusable-record';
import type { Placing, StatedSpace } from './file-space';
import { summariseRecord, writeGeometryRecord, type FileKey } from './geometry-record';
import type { ImportRow } from './get-import-row';
import { besideHash, type BesideBlob } from './beside-blobs';
import { findBeside } from './find-beside';
import { markMeasuring, startFile, type ImportFile } from './lease';
import { openImportFile } from './open-import-file';
import { showSpace } from './show-space';
import { unitRemarks } from './unit-remarks';
import { writeVersion } from './write-version';

export interface FileWork {
  db: Database;
  engine: Pick<EnginePool, 'measure'>;
  holder: string;
  importRow: ImportRow;
  /** Who submitted the import: versions are in their name. */
  actor: Actor;
  /** Aborted when the file is not the holder's any more: then measuring it is dropped. */
  lost?: AbortSignal;
}

/**
 * Takes one held file to its end: read, measured (or found measured before), and put under its asset with values, history
 * and its own end in one transaction. A file that cannot be read ends as failed. Throws only what may pass: storage or
 * database out of reach. Answers false where it was not begun: it is not held, or its import is paused or over.
 */
export async function measureImportFile(work: FileWork, fileId: string): Promise<boolean> {
  const file = await startFile(work.db, fileId, work.holder);
  if (file) await measureStarted(work, file);
  return file !== null;
}

async function measureStarted(work: FileWork, started: ImportFile): Promise<void> {
  const { db, holder, importRow } = work;
  let file: ImportFile;
  let beside: BesideBlob[];
  try {
    const opened = await openImportFile(work, started);
    if (opened === null) return;
    file = opened;
    beside = await findBeside(db, file);
  } catch (error) {
    if (!(error instanceof MeshError)) throw error;
    return failFile(work, started.id, errorOf(started.name, { ...error, message: error.detail }));
  }
  const fileId = file.id;
  const plan = { ...file.plan!, name: file.name };
  if (plan.asset === null) return failFile(work, fileId, { code: 'name_not_matched', message: 'The name does not match the show’s pattern. Give an asset, or change the pattern.', line: null, column: null });
  const { scheme, boundary, triangles, creasing, partsBy, weld, turnFaces } = importRow;
  const key = { sha256: file.sha256, options: { scheme, boundary, triangles, creasing, partsBy, weld, turnFaces } satisfies MeasureOptions, besideSha256: besideHash(file.name, beside) };
  const space = await showSpace(db, importRow.showId, importRow.otherSpace);
  const known = await findReusableRecord(db, key, { name: file.name, showId: importRow.showId, space });
  let measured: Measured | null = null;
  if (known === null) {
    const outcome = await work.engine.measure({ name: file.name, sha256: key.sha256, options: key.options, space, beside }, () => void markMeasuring(db, fileId, holder).catch(() => undefined), work.lost);
    if (!outcome.ok) return failFile(work, fileId, errorOf(file.name, outcome));
    measured = outcome;
  }
  try {
    await db.transaction((tx) => endMeasured(tx, work, fileId, { ...plan, asset: plan.asset! }, key, known, measured));
  } catch (error) {
    const reference = refusedNumbers(error);
    if (reference === null) throw error;
    log.error({ err: error, reference, file: file.name, sha256: file.sha256 }, 'a measurement was refused by the database');
    await failFile(work, fileId, { code: 'numbers_refused', message: `A measured number did not pass the check before it is stored. Reference ${reference}.`, line: null, column: null });
  }
}

/** What measuring gave, and how the file was brought into the show's space. */
interface Measured {
  cage: MeasuredCage;
  placing: Placing;
  stated: StatedSpace;
}

async function endMeasured(
  tx: Transaction,
  work: FileWork,
  fileId: string,
  plan: PlannedFile & { asset: string },
  key: FileKey,
  known: string | null,
  measured: Measured | null,
): Promise<void> {
  const held = await lockHeldFile(tx, fileId, work.holder);
  if (!held) return;
  const { showId, createdBy } = work.importRow;
  const recordId = known ?? (await writeGeometryRecord(tx, { ...key, placing: measured!.placing }, measured!.cage, measured!.stated));
  const version = await writeVersion(tx, { showId, plan, outsideId: held.outsideIdOverride, recordId, ...key, importFileId: fileId, createdBy });
  const summary = await summariseRecord(tx, recordId);
  const remarks = [...version.remarks, ...(await unitRemarks(tx, { showId, assetId: version.assetId, recordId }))];
  if (version.changed) {
    await recordEvent(tx, { actor: work.actor, origin: 'import' }, { showId, act: 'import-version', subject: version.asset, items: [{ field: 'version', before: version.before, after: version.label }] });
    await refreshAssetValues(tx, { assetId: version.assetId, importedBy: createdBy });
  }
  await endFile(tx, held, { state: 'done', assetId: version.assetId, versionId: version.versionId, parts: summary.parts, problems: summary.problems, remark: remarks.join(' ') || null });
}

async function failFile(work: FileWork, fileId: string, error: ImportFileError): Promise<void> {
  await work.db.transaction(async (tx) => {
    const held = await lockHeldFile(tx, fileId, work.holder);
    if (held) await endFile(tx, held, { state: 'failed', error });
  });
}

function errorOf(name: string, outcome: Required<ImportFileError>): ImportFileError {
  const { code, line, column, excerpt } = outcome;
  if (code !== 'measuring_failed') return { code, message: sentence(outcome.message), line, column, excerpt };
  const reference = randomUUID();
  log.error({ reference, file: name, fault: outcome.message }, 'the engine failed on a file');
  return { code, message: `Measuring this file failed on our side. Reference ${reference}.`, line, column };
}

const sentence = (clause: string): string => `${clause.charAt(0).toUpperCase()}${clause.slice(1)}${/[.!?]$/.test(clause) ? '' : '.'}`;

/** A reference for the log when a constraint or a type of the database refused a row: trying again would change nothing. */
function refusedNumbers(error: unknown): string | null {
  const cause = error instanceof Error && error.cause instanceof Error ? error.cause : error;
  const code = cause instanceof Error && 'code' in cause && typeof cause.code === 'string' ? cause.code : '';
  return /^(22|23)/.test(code) ? randomUUID() : null;
}
