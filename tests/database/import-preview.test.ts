import fc from 'fast-check';
import { expect, test } from 'vitest';
import { createHash } from 'node:crypto';
import { getImportPreparation } from '@/lib/imports/get-import-preparation';
import { previewImport, type PreviewRow } from '@/lib/rules/import-preview';
import { cubeObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { importFiles } from '../support/imports';

const OPTIONS = { scheme: 'polyhedral', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group' };

/** A few cubes, so that equal bytes come again. */
const bytesOf = (size: number): string => cubeObj({ size: size + 1 });
const sha = (text: string): string => createHash('sha256').update(text).digest('hex');

const folder = fc.constantFrom('', '', 'props/', 'sets/', 'a/', 'b/props/');
const path = fc.tuple(folder, fc.constantFrom('ox', 'hook'), fc.constantFrom('', '_v001', '_v002', '_v4')).map((steps) => `${steps.join('')}.obj`);
const drop = fc.uniqueArray(fc.record({ path, size: fc.integer({ min: 1, max: 3 }) }), { selector: (file) => file.path, minLength: 1, maxLength: 5 });

interface Told {
  name: string;
  asset: string | null;
  version: string | null;
  unchanged: boolean;
}

const told = (row: PreviewRow): Told => ({ name: row.name, asset: row.asset, version: row.label, unchanged: row.outcome === 'unchanged' });

/** What the import desk says of a drop, from what the page knows of the show. */
async function preview(cast: Cast, files: readonly { path: string; size: number }[], pattern: string | null): Promise<Told[]> {
  const { assets } = await getImportPreparation(cast.contextOf('td'), { show: cast.show.code });
  const dropped = files.map(({ path: name, size }) => ({ name, sha256: sha(bytesOf(size)) }));
  return previewImport(dropped, pattern, assets, OPTIONS).filter((row) => row.asset !== null).map(told).sort((a, b) => (a.name < b.name ? -1 : 1));
}

async function bring(cast: Cast, files: readonly { path: string; size: number }[], goes: ReadonlySet<string>, pattern: string | null): Promise<Told[]> {
  const sent = Object.fromEntries(files.filter((file) => goes.has(file.path)).map((file) => [file.path, bytesOf(file.size)]));
  if (Object.keys(sent).length === 0) return [];
  const answer = await importFiles(cast.contextOf('td'), cast.show.code, sent, { scheme: 'polyhedral', name_pattern: pattern });
  return answer.files.map(({ name, asset, version, remarks }) => ({ name, asset, version, unchanged: remarks.includes('unchanged') })).sort((a, b) => (a.name < b.name ? -1 : 1));
}

test.each([[null], ['{asset}_v{version}'], ['{category}/{asset}_v{version}']])('what the preview says is what happens, drop after drop (pattern %s)', async (pattern) => {
  await fc.assert(
    fc.asyncProperty(fc.array(drop, { minLength: 1, maxLength: 3 }), async (drops) => {
      const cast = await createCast();
      for (const files of drops) {
        const said = await preview(cast, files, pattern);
        expect(await bring(cast, files, new Set(said.map((row) => row.name)), pattern)).toEqual(said);
      }
    }),
    { numRuns: 12 },
  );
});

test('where files go is decided when the import is submitted, whatever the pattern becomes then', async () => {
  const cast = await createCast();
  const first = await importFiles(cast.contextOf('td'), cast.show.code, { 'props/hammer.obj': bytesOf(1), 'sets/hammer.obj': bytesOf(2) }, { scheme: 'polyhedral' });
  expect(first.files.map((file) => file.asset)).toEqual(['props_hammer', 'sets_hammer']);
  const later = await importFiles(cast.contextOf('td'), cast.show.code, { 'sets/hammer.obj': bytesOf(3) }, { scheme: 'polyhedral' });
  expect(later.files[0]).toMatchObject({ asset: 'sets_hammer', version: 'v002' });
});
