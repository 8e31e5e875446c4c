import { and, eq, ne, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { joinBytes } from '@/lib/formats/join-bytes';
import { weightsName } from '@/lib/formats/joint-weights';
import { extensionOf } from '@/lib/formats/mesh-extensions';
import { MeshError } from '@/lib/formats/mesh-error';
import { folderOf, mayDrawOnOthers, MOST_SCANNED_BYTES, namesBeside } from '@/lib/formats/names-beside';
import { openBlob } from '@/lib/storage/open-blob';
import type { BesideBlob } from './beside-blobs';

interface Row {
  name: string;
  sha256: string;
  byteSize: number;
  errorMessage: string | null;
  isEntry: boolean;
}

/**
 * The files of the same import that a mesh is read with: an OBJ's skin weights, a glTF's buffers, the layers that a text layer refers to. Their paths are those of
 * the import. Errors: MeshError beside_broken where one of them could not be unpacked; what storage throws.
 */
export async function findBeside(db: Database, file: { importId: string; name: string; sha256: string; byteSize: number }): Promise<BesideBlob[]> {
  if (!mayDrawOnOthers(file.name)) return [];
  const rows = new Map((await candidates(db, file)).map((row) => [row.name, row]));
  if (rows.size === 0) return [];
  const self: Row = { ...file, errorMessage: null, isEntry: false };
  const names = await namesBeside(file.name, (path) => rows.has(path), (path) => readStored(path === file.name ? self : rows.get(path)!));
  return names.map((name) => {
    const row = rows.get(name)!;
    if (row.isEntry && row.errorMessage !== null) throw new MeshError({ code: 'beside_broken', found: name, detail: `${name.slice(0, 200)}, which it is read with: ${row.errorMessage}` });
    return { path: name, sha256: row.sha256 };
  });
}

/** What may be mentioned, by its name alone. */
function candidates(db: Database, { importId, name }: { importId: string; name: string }): Promise<Row[]> {
  const f = importFiles;
  const extension = extensionOf(name);
  const alike =
    extension === 'obj'
      ? sql`${f.name} = ${folderOf(name) + weightsName(name)}`
      : extension === 'gltf'
        ? sql`${f.name} ~* '\\.(bin|glbin|buffer)$'`
        : sql`${f.name} ~* '\\.usd[ac]?$'`;
  return db
    .select({ name: f.name, sha256: f.sha256, byteSize: f.byteSize, errorMessage: f.errorMessage, isEntry: sql<boolean>`${f.archiveId} is not null` })
    .from(f)
    .where(and(eq(f.importId, importId), ne(f.name, name), alike));
}

async function readStored({ sha256, byteSize }: Row): Promise<Uint8Array> {
  if (byteSize > MOST_SCANNED_BYTES) return new Uint8Array(0);
  const pieces: Uint8Array[] = [];
  for await (const piece of await openBlob(sha256)) pieces.push(piece);
  return joinBytes(pieces);
}
