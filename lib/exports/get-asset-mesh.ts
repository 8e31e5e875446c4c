import { createHash } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { importFiles } from '@/db/schema/import-files';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { fileStream } from '@/lib/http/file-stream';
import { matchesEtag } from '@/lib/http/matches-etag';
import { findBeside } from '@/lib/imports/find-beside';
import { getCurrentAsset } from '@/lib/parts/get-current-asset';
import type { AssetMeshInput } from '@/lib/rules/inputs/part-ref';
import { StudioError } from '@/lib/rules/studio-error';
import { METRES_PER } from '@/lib/rules/units';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { FileCache, type CachedFile } from '@/lib/storage/file-cache';
import { makeMeshInThread } from './mesh-threads';

/** Part of every key: a change of the file's build raises it. */
const MESH_FORM = '1';

const meshCache = new FileCache<CachedFile>('meshes', { files: 500, bytes: 1024 ** 3 });

/** Refinements for a display mesh of about 100,000 to 200,000 faces at most; a cage that is denser is shown as it is. */
function displayLevel(faces: number): number {
  return faces <= 3_000 ? 3 : faces <= 12_000 ? 2 : faces <= 100_000 ? 1 : 0;
}

/** The display mesh of an asset's version, the current one unless another is named, as GLB (see assetGlb), made on first view. Strong ETag, 304 for who has it. */
export async function getAssetMesh(context: Context, input: AssetMeshInput, request: Request): Promise<Response> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { asset, version, record } = await getCurrentAsset(db, show.id, input.asset, input.version);
  const [file] = version.importFileId ? await db.select({ importId: importFiles.importId, name: importFiles.name, byteSize: importFiles.byteSize }).from(importFiles).where(eq(importFiles.id, version.importFileId)) : [];
  if (!file) throw new StudioError('not_found', `The cage of ${asset.code} ${version.label} is not in storage.`);
  const { scheme, boundary, triangles, creasing, partsBy, weld, turnFaces, contentSha256: sha256, unitScale, turn } = record;
  const task = {
    name: file.name,
    sha256,
    options: { scheme, boundary, triangles, creasing, partsBy, weld, turnFaces },
    beside: record.besideSha256 === '' ? [] : await findBeside(db, { ...file, sha256 }),
    placing: { unitScale, turn },
    level: displayLevel(record.faces),
    metresPerUnit: METRES_PER[show.linearUnit] * asset.scale,
  };
  const key = createHash('sha256').update(JSON.stringify([MESH_FORM, record.engineVersion, task])).digest('hex');
  const make = () => meshCache.keep(key, (path) => makeMeshInThread({ ...task, path }));
  const made = await make();
  const headers = { etag: `"${made.sha256}"`, 'cache-control': 'private, no-cache, no-transform', vary: 'authorization, cookie' };
  if (matchesEtag(request.headers.get('if-none-match'), made.sha256)) return new Response(null, { status: 304, headers });
  const body = await fileStream(made.path, made.byteSize).catch(async () => {
    meshCache.forget(key);
    const again = await make();
    return fileStream(again.path, again.byteSize);
  });
  return new Response(body, { headers: { ...headers, 'content-type': 'model/gltf-binary', 'content-length': String(made.byteSize) } });
}
