import { NodeIO } from '@gltf-transform/core';
import { randomUUID } from 'node:crypto';
import { describe, expect, test } from 'vitest';
import { GET } from '@/app/api/v1/shows/[show]/assets/[asset]/mesh/route';
import { storeBlob } from '@/lib/storage/store-blob';
import { eachCaller, expectProblem, call } from '../support/api';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { boxPart, putCage, type TestPart } from '../support/put-cage';

/** A cage with its file in storage, as an import leaves it. */
async function putStoredCage(cast: Cast, asset: string, parts: TestPart[], scale = 1): Promise<void> {
  let first = 1;
  const lines = parts.flatMap((part) => {
    const text = [`g ${part.name}`, ...part.positions.map((p) => `v ${p.join(' ')}`), ...part.faces.map((face) => `f ${face.map((vertex) => vertex + first).join(' ')}`)];
    first += part.positions.length;
    return text;
  });
  const text = `${lines.join('\n')}\n`;
  const { sha256, byteSize } = await storeBlob((async function* () { yield Buffer.from(text); })(), { maxBytes: 1e6 });
  const assetId = await putCage(cast.show, cast.people.td, asset, parts, { scale, contentSha256: sha256 });
  const fileId = randomUUID();
  await asOwner('insert into blobs (sha256, byte_size) values ($1, $2) on conflict do nothing', [sha256, byteSize]);
  await asOwner(
    `with i as (insert into imports (show_id, scheme, boundary, parts_by, created_by) values ($1, 'polyhedral', 'edge-and-corner', 'group', $2) returning id)
     insert into import_files (id, import_id, name, state, sha256, byte_size, ended_at) select $3, i.id, $4, 'done', $5, $6, now() from i`,
    [cast.show.id, cast.people.td.id, fileId, `${asset}.obj`, sha256, byteSize],
  );
  await asOwner('update asset_versions set import_file_id = $1 where asset_id = $2 and import_file_id is null', [fileId, assetId]);
}

async function createStored(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'cm', scheme: 'polyhedral' });
  await putStoredCage(cast, 'crate', [boxPart('body.L', [0, 0, 0], [20, 30, 40]), boxPart('lid', [1000, 0, 0], [1010, 10, 10])], 2);
  return cast;
}

const fetchMesh = (cast: Cast, headers: Record<string, string> = {}, version?: string) => {
  const url = new URL(`http://127.0.0.1:3000/api/v1/test${version ? `?version=${version}` : ''}`);
  return GET(new Request(url, { headers: { host: url.host, authorization: `Bearer ${cast.people.artist.token}`, ...headers } }), {
    params: Promise.resolve({ show: cast.show.code, asset: 'crate' }),
  });
};

describe('the display mesh', () => {
  eachCaller('mesh', GET, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['part_current'], async (caller) => {
    const cast = await createStored();
    return { params: { show: cast.show.code, asset: 'crate' }, token: cast.tokenOf(caller) };
  });

  test('has a surface and a cage for each part, in metres at the asset’s scale', async () => {
    const response = await fetchMesh(await createStored());
    expect(response.headers.get('content-type')).toBe('model/gltf-binary');
    const document = await new NodeIO().readBinary(new Uint8Array(await response.arrayBuffer()));
    const nodes = document.getRoot().listNodes().filter((node) => node.getMesh() !== null);
    expect(nodes.map((node) => [node.getExtras().kind, node.getExtras().part])).toEqual([
      ['surface', 'body.L'], ['surface', 'lid'], ['cage', 'body.L'], ['cage', 'lid'],
    ]);
    const [origin] = document.getRoot().listNodes().filter((node) => node.getMesh() === null).map((node) => node.getTranslation());
    const boxes = nodes.map((node) => {
      const primitive = node.getMesh()!.listPrimitives()[0];
      const positions = primitive.getAttribute('POSITION')!.getArray()!;
      const used = [...primitive.getIndices()!.getArray()!];
      return [0, 1, 2].map((axis) => {
        const values = used.map((vertex) => positions[3 * vertex + axis] + origin[axis]);
        return [Math.min(...values), Math.max(...values)].map((value) => Number(value.toFixed(5)) + 0);
      });
    });
    const body = [[0, 0.4], [0, 0.6], [0, 0.8]];
    const lid = [[20, 20.2], [0, 0.2], [0, 0.2]];
    expect(boxes).toEqual([body, lid, body, lid]);
    // A box has 12 edges and, as triangles, 12 faces.
    expect(nodes.map((node) => node.getMesh()!.listPrimitives()[0].getIndices()!.getCount())).toEqual([36, 36, 24, 24]);
  });

  test('who has it gets 304', async () => {
    const cast = await createStored();
    const first = await fetchMesh(cast);
    await first.arrayBuffer();
    const again = await fetchMesh(cast, { 'if-none-match': first.headers.get('etag') ?? '' });
    expect(again.status).toBe(304);
  });

  test('of an older version when it is named, and not found where there is no such version', async () => {
    const cast = await createStored();
    const first = await fetchMesh(cast);
    const before = Buffer.from(await first.arrayBuffer());
    await putStoredCage(cast, 'crate', [boxPart('body.L', [0, 0, 0], [20, 30, 50])], 2);
    const now = Buffer.from(await (await fetchMesh(cast)).arrayBuffer());
    expect(now.equals(before)).toBe(false);
    expect(Buffer.from(await (await fetchMesh(cast, {}, 'v001')).arrayBuffer()).equals(before)).toBe(true);
    expect(Buffer.from(await (await fetchMesh(cast, {}, 'v002')).arrayBuffer()).equals(now)).toBe(true);
    expect((await fetchMesh(cast, {}, 'v003')).status).toBe(404);
  });

  test('an asset that is not there is not found', async () => {
    const cast = await createStored();
    expectProblem(await call(GET, { params: { show: cast.show.code, asset: 'nothing' }, token: cast.people.td.token }), 404, 'not_found');
  });
});
