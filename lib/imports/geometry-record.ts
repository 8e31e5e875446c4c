import { and, eq } from 'drizzle-orm';
import type { Executor, Transaction } from '@/db/client';
import { findings } from '@/db/schema/findings';
import { geometryComponents } from '@/db/schema/geometry-components';
import { geometryParts } from '@/db/schema/geometry-parts';
import { geometryRecords } from '@/db/schema/geometry-records';
import { ENGINE_VERSION } from '@/lib/engine/measure';
import type { MeasuredCage, MeasureOptions } from '@/lib/engine/measured';
import { AS_IT_IS, type Placing, type StatedSpace } from './file-space';

/** Rows of one insert: PostgreSQL takes at most 65,535 parameters in a statement. */
const CHUNK = 1_000;

/** What a file is and how it is measured. */
export interface FileKey {
  sha256: string;
  options: MeasureOptions;
  /** Hash of the files that were read beside it; left out for a file that was read alone. */
  besideSha256?: string;
}

/** Key of a record: the file's, and what was done to it on reading, which is nothing unless said. The record's lengths and axes are those that came of it. */
export interface RecordKey extends FileKey {
  placing?: Placing;
}

/** Id of the measurement of these bytes under these options by this engine, if it was made before. */
export async function findGeometryRecord(db: Executor, { sha256, options, besideSha256 = '', placing = AS_IT_IS }: RecordKey): Promise<string | null> {
  const r = geometryRecords;
  const [found] = await db
    .select({ id: r.id })
    .from(r)
    .where(
      and(
        eq(r.contentSha256, sha256),
        eq(r.scheme, options.scheme),
        eq(r.boundary, options.boundary),
        eq(r.triangles, options.triangles),
        eq(r.creasing, options.creasing),
        eq(r.partsBy, options.partsBy),
        eq(r.weld, options.weld === true),
        eq(r.turnFaces, options.turnFaces === true),
        eq(r.besideSha256, besideSha256),
        eq(r.unitScale, placing.unitScale),
        eq(r.turn, placing.turn),
        eq(r.engineVersion, ENGINE_VERSION),
      ),
    );
  return found?.id ?? null;
}

/** Stores a measurement, with what the file states of its space; answers the id of the equal one where another transaction was first. */
export async function writeGeometryRecord(tx: Transaction, key: RecordKey, cage: MeasuredCage, stated?: StatedSpace): Promise<string> {
  const { besideSha256 = '', placing = AS_IT_IS } = key;
  const [record] = await tx
    .insert(geometryRecords)
    .values({ contentSha256: key.sha256, ...key.options, besideSha256, ...placing, statedMetresPerUnit: stated?.metresPerUnit ?? null, statedUpAxis: stated?.upAxis ?? null, engineVersion: ENGINE_VERSION, faces: cage.faces, vertices: cage.vertices })
    .onConflictDoNothing()
    .returning({ id: geometryRecords.id });
  if (!record) {
    const other = await findGeometryRecord(tx, key);
    if (!other) throw new Error('A geometry record is there and cannot be found.');
    return other;
  }
  const partIds = await writeParts(tx, record.id, cage);
  await writeComponents(tx, cage, partIds);
  await inChunks(cage.findings, (chunk, start) => tx.insert(findings).values(chunk.map((finding, index) => ({ recordId: record.id, ordinal: start + index, ...finding }))));
  return record.id;
}

async function inChunks<T>(items: readonly T[], write: (chunk: T[], start: number) => Promise<unknown>): Promise<void> {
  for (let start = 0; start < items.length; start += CHUNK) await write(items.slice(start, start + CHUNK), start);
}

async function writeParts(tx: Transaction, recordId: string, cage: MeasuredCage): Promise<Map<string, string>> {
  const ids = new Map<string, string>();
  await inChunks(cage.parts, async (chunk, start) => {
    const rows = await tx
      .insert(geometryParts)
      .values(
        chunk.map((part, index) => {
          const [minX, minY, minZ, maxX, maxY, maxZ] = part.bounds.every(Number.isFinite) ? part.bounds : [0, 0, 0, 0, 0, 0];
          return {
            recordId,
            name: part.name,
            ordinal: start + index,
            faces: part.faces,
            maxValence: part.maxValence,
            openEdges: part.openEdges,
            looksLikeSheet: part.looksLikeSheet,
            capAreaShare: finiteOrZero(part.capAreaShare),
            capVolumeShare: finiteOrZero(part.capVolumeShare),
            minX, minY, minZ, maxX, maxY, maxZ,
          };
        }),
      )
      .returning({ id: geometryParts.id, name: geometryParts.name });
    for (const { id, name } of rows) ids.set(name, id);
  });
  return ids;
}

/** A part whose volume vanishes has no share; the finding says so. */
const finiteOrZero = (value: number): number => (Number.isFinite(value) ? value : 0);

async function writeComponents(tx: Transaction, cage: MeasuredCage, partIds: ReadonlyMap<string, string>): Promise<void> {
  const rows = cage.parts.flatMap((part) =>
    part.components.map((component, ordinal) => ({
      partId: partIds.get(part.name)!,
      ordinal,
      faces: component.faces,
      volume: component.solid.volume,
      centroid: component.solid.centroid,
      centralSecond: component.solid.centralSecond,
      area: component.surface.area,
      surfaceCentroid: component.surface.centroid,
      surfaceCentralSecond: component.surface.centralSecond,
      cageVolume: component.cage.volume,
      cageCentroid: component.cage.centroid,
      cageCentralSecond: component.cage.centralSecond,
      hollow: component.hollow ? [...component.hollow] : null,
      hollowLimits: component.hollowLimits ? [component.hollowLimits.curvature, ...component.hollowLimits.position, ...component.hollowLimits.error] : null,
      errorEstimate: component.errorEstimate,
      surfaceErrorEstimate: component.surfaceErrorEstimate,
    })),
  );
  await inChunks(rows, (chunk) => tx.insert(geometryComponents).values(chunk));
}

/** What an import says of a record: its parts, and how many findings block. */
export async function summariseRecord(db: Executor, recordId: string): Promise<{ parts: number; problems: number }> {
  const parts = await db.$count(geometryParts, eq(geometryParts.recordId, recordId));
  return { parts, problems: await db.$count(findings, and(eq(findings.recordId, recordId), eq(findings.severity, 'problem'))) };
}
