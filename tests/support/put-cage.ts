import { createHash } from 'node:crypto';
import { and, desc, eq } from 'drizzle-orm';
import { database } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { assets } from '@/db/schema/assets';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions } from '@/lib/engine/measured';
import { writeGeometryRecord } from '@/lib/imports/geometry-record';
import type { Category } from '@/lib/rules/states';
import { refreshAssetValues } from '@/lib/values/refresh-asset-values';

/** A part of a test cage: polygons over its own vertices, counter-clockwise from outside. */
export interface TestPart {
  name: string;
  positions: [number, number, number][];
  faces: number[][];
}

/** A box from its low to its high corner; without its top (z) when it is open. */
export function boxPart(name: string, low: [number, number, number], high: [number, number, number], open = false): TestPart {
  const [x0, y0, z0] = low;
  const [x1, y1, z1] = high;
  const positions: TestPart['positions'] = [[x0, y0, z0], [x1, y0, z0], [x1, y1, z0], [x0, y1, z0], [x0, y0, z1], [x1, y0, z1], [x1, y1, z1], [x0, y1, z1]];
  const faces = [[0, 3, 2, 1], [0, 1, 5, 4], [1, 2, 6, 5], [2, 3, 7, 6], [3, 0, 4, 7], [4, 5, 6, 7]];
  return { name, positions, faces: open ? faces.slice(0, 5) : faces };
}

/** One cage of several parts that touch nowhere, each a group. */
export function cageOf(parts: readonly TestPart[]): Cage {
  const positions: number[] = [];
  const faceStarts = [0];
  const faceVertices: number[] = [];
  const labels: number[] = [];
  parts.forEach((part, label) => {
    const first = positions.length / 3;
    positions.push(...part.positions.flat());
    for (const face of part.faces) {
      faceVertices.push(...face.map((vertex) => first + vertex));
      faceStarts.push(faceVertices.length);
      labels.push(label);
    }
  });
  return {
    positions: Float64Array.from(positions),
    faceStarts: Uint32Array.from(faceStarts),
    faceVertices: Uint32Array.from(faceVertices),
    groups: { names: parts.map((part) => part.name), labels: Int32Array.from(labels) },
    objects: null,
    materials: null,
    joints: null,
    creaseVertices: new Uint32Array(),
    creaseSharpness: new Float32Array(),
    cornerVertices: new Uint32Array(),
    cornerSharpness: new Float32Array(),
    boundary: null,
    faceLines: null,
    metresPerUnit: null,
    upAxis: null,
    warnings: [],
  };
}

const POLYHEDRAL: MeasureOptions = { scheme: 'polyhedral', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group' };

export interface PutOptions {
  category?: Category;
  scale?: number;
  version?: number;
  options?: Partial<MeasureOptions>;
  /** Hash of the bytes that the cage is in, where they are stored. */
  contentSha256?: string;
}

/** Measures a cage as a polyhedron and makes it a version of the asset (the next one unless said), as an import does. Answers the asset's id. */
export async function putCage(show: { id: string }, by: { id: string }, asset: string, parts: readonly TestPart[], { category = 'prop', scale, version, options, contentSha256 }: PutOptions = {}): Promise<string> {
  const cage = cageOf(parts);
  const measure = { ...POLYHEDRAL, ...options };
  const measured = measureCage(cage, { ...measure, shells: true });
  const sha256 = contentSha256 ?? createHash('sha256').update(JSON.stringify(parts)).digest('hex');
  return database().transaction(async (tx) => {
    await tx.insert(assets).values({ showId: show.id, code: asset, category, scale }).onConflictDoNothing();
    const [row] = await tx.select().from(assets).where(and(eq(assets.showId, show.id), eq(assets.code, asset)));
    const [last] = await tx.select().from(assetVersions).where(eq(assetVersions.assetId, row.id)).orderBy(desc(assetVersions.number)).limit(1);
    const number = version ?? (last?.number ?? 0) + 1;
    const recordId = await writeGeometryRecord(tx, { sha256, options: measure }, measured);
    await tx.insert(assetVersions).values({ assetId: row.id, number, label: `v${String(number).padStart(3, '0')}`, recordId, createdBy: by.id });
    await refreshAssetValues(tx, { assetId: row.id, importedBy: by.id });
    return row.id;
  });
}
