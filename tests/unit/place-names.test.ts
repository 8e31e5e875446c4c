import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { planImport } from '@/lib/rules/import-plan';
import { previewImport, worthHashing } from '@/lib/rules/import-preview';
import { optionsWord, type KnownAsset } from '@/lib/rules/known-asset';

const OPTIONS = { scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group' };
const named = (names: readonly string[]) => names.map((name) => ({ name }));

/** What the show has after a plan, without takes: as the server keeps it. */
function after(known: readonly KnownAsset[], names: readonly string[]): KnownAsset[] {
  const assets = new Map(known.map((asset) => [asset.asset, asset]));
  for (const file of planImport(named(names), null, known)) {
    if (file.asset === null) continue;
    const entry = assets.get(file.asset) ?? { asset: file.asset, category: file.category, versions: [], name: file.readName ?? file.asset, places: [] };
    const number = file.version ?? Math.max(0, ...entry.versions) + 1;
    const places = file.place === '' || entry.places?.includes(file.place) ? entry.places : [...(entry.places ?? []), file.place];
    assets.set(file.asset, { ...entry, versions: [...entry.versions, number], places });
  }
  return [...assets.values()];
}
const assetsOf = (known: readonly KnownAsset[], ...names: string[]) => planImport(named(names), null, known).map((file) => file.asset);

describe('one name in several folders', () => {
  test('a later drop from another folder makes a second asset, and says so', () => {
    const known = after([], ['props/hammer.obj']);
    expect(assetsOf(known, 'sets/hammer.obj')).toEqual(['sets_hammer']);
    const [row] = previewImport(named(['sets/hammer.obj']), null, known);
    expect(row).toMatchObject({ outcome: 'new_asset', asset: 'sets_hammer', attention: 1 });
    expect(row.warnings.join(' ')).toMatch(/another folder/);
  });

  test('assets that were told apart keep their codes in later drops, in any company', () => {
    const known = after([], ['props/hammer.obj', 'sets/hammer.obj']);
    expect(known.map((asset) => asset.asset).sort()).toEqual(['props_hammer', 'sets_hammer']);
    expect(assetsOf(known, 'sets/hammer_v002.obj')).toEqual(['sets_hammer']);
    expect(assetsOf(known, 'delivery/props/hammer_v002.obj', 'delivery/sets/hammer_v002.obj')).toEqual(['props_hammer', 'sets_hammer']);
    expect(assetsOf(known, 'costumes/hammer.obj')).toEqual(['costumes_hammer']);
  });

  test('two categories are never one asset, whatever the numbers', () => {
    expect(assetsOf([], 'props/hammer_v001.obj', 'sets/hammer_v002.obj')).toEqual(['props_hammer', 'sets_hammer']);
    expect(assetsOf(after([], ['props/hammer_v001.obj']), 'sets/hammer_v002.obj')).toEqual(['sets_hammer']);
  });

  test('a new number from a folder that says no category follows the asset that is there, with a warning', () => {
    const known = after([], ['creatures/ox_v012.obj']);
    const [row] = previewImport(named(['old/ox_v011.obj']), null, known);
    expect(row).toMatchObject({ asset: 'ox', outcome: 'new_version', label: 'v011' });
    expect(row.warnings.join(' ')).toMatch(/came from creatures until now/);
  });

  test('a number that is there, from a folder that shares nothing, is another asset', () => {
    expect(assetsOf(after([], ['creatures/ox_v012.obj']), 'old/ox_v012.obj')).toEqual(['old_ox']);
  });

  test('a delivery under another top folder follows what came before', () => {
    const known = after([], ['delivery_1/props/hook.obj']);
    expect(assetsOf(known, 'delivery_2/props/hook.obj')).toEqual(['hook']);
    expect(previewImport(named(['delivery_2/props/hook_v005.obj']), null, after([], ['delivery_1/props/hook_v004.obj']))[0].attention).toBe(0);
  });

  test('a file dropped without its folders follows the one asset of its name', () => {
    expect(assetsOf(after([], ['props/hook.obj']), 'hook_v002.obj')).toEqual(['hook']);
    expect(assetsOf(after([], ['props/hook.obj', 'sets/hook.obj']), 'hook_v002.obj')).toEqual(['hook']);
    expect(assetsOf(after([], ['hook.obj']), 'props/hook_v002.obj')).toEqual(['hook']);
  });

  test('a code that is there is not given to another asset', () => {
    const known: KnownAsset[] = [{ asset: 'props_hook', category: 'prop', versions: [1] }, { asset: 'hook', category: 'set', versions: [1], places: ['sets'] }];
    expect(assetsOf(known, 'a/props/hook.obj')).toEqual(['a_props_hook']);
  });

  test('a show’s own pattern tells assets apart by category where it reads one, and else does not', () => {
    const apart = planImport(named(['props/hook_v1.obj', 'sets/hook_v1.obj']), '{category}/{asset}_v{version}');
    expect(apart.map((file) => file.asset)).toEqual(['props_hook', 'sets_hook']);
    const [first, second] = planImport(named(['props/hook_v1.obj', 'sets/hook_v1.obj']), '{asset}_v{version}');
    expect([first.asset, second.asset, first.duplicate, second.duplicate]).toEqual(['hook', 'hook', false, true]);
  });

  const folder = fc.constantFrom('', 'a/', 'b/', 'props/', 'sets/', 'a/props/', 'b/sets/', 'x/a/', 'ox/');
  const path = fc.tuple(folder, fc.constantFrom('ox', 'hook', 'a_hook'), fc.constantFrom('', '_v001', '_v002', '_v7')).map((steps) => `${steps.join('')}.obj`);
  const drop = fc.uniqueArray(path, { maxLength: 10 });

  test('over any two drops: order does not count, codes of two assets differ, and no two folders with one number share an asset', () => {
    fc.assert(
      fc.property(drop, drop, (first, second) => {
        const known = after([], first);
        const forth = planImport(named(second), null, known);
        expect(planImport(named(second.toReversed()), null, known.toReversed()).toReversed()).toEqual(forth);
        const seen = new Map<string, string>();
        // A file that is named by another asset's whole code means that asset: such a pair is a duplicate, and said to be one.
        for (const { asset, place, version, readName } of forth) {
          const key = `${asset} ${version} ${readName}`;
          expect(seen.get(key) ?? place).toBe(place);
          seen.set(key, place);
        }
        const categories = new Map<string, string>();
        for (const { asset, place } of forth) {
          const category = /(props|sets)$/.exec(place)?.[1];
          if (category === undefined) continue;
          expect(categories.get(asset!) ?? category).toBe(category);
          categories.set(asset!, category);
        }
      }),
      { numRuns: 400 },
    );
  });

  test('the same drop again means the same assets', () => {
    fc.assert(
      fc.property(drop, (names) => {
        const first = planImport(named(names), null);
        // A second asset that was there before any folder told them apart keeps its bare name.
        expect(planImport(named(names), null, after([], names)).map((file) => file.asset)).toEqual(first.map((file) => file.asset));
      }),
      { numRuns: 400 },
    );
  });
});

describe('bytes that are there', () => {
  const sha = 'a'.repeat(64);
  const known: KnownAsset[] = [{ asset: 'ox', category: 'creature', versions: [11, 12, 12], contents: [{ number: 11, take: 1, bytes: 9, sha256: 'b'.repeat(64), options: optionsWord(OPTIONS) }, { number: 12, take: 2, bytes: 7, sha256: sha, options: optionsWord(OPTIONS) }] }];
  const look = (name: string, sha256: string | null, options = OPTIONS) => previewImport([{ name, sha256 }], null, known, options)[0];

  test.each([
    ['ox_v012.obj', sha, OPTIONS, 'unchanged', 'v012-2'],
    ['ox.obj', sha, OPTIONS, 'unchanged', 'v012-2'],
    ['ox_v013.obj', sha, OPTIONS, 'unchanged', 'v012-2'],
    ['ox_v011.obj', 'b'.repeat(64), OPTIONS, 'unchanged', 'v011'],
    ['ox_v012.obj', 'b'.repeat(64), OPTIONS, 'next_take', 'v012-3'],
    ['ox_v012.obj', null, OPTIONS, 'next_take', 'v012-3'],
    ['ox_v012.obj', sha, { ...OPTIONS, partsBy: 'whole' }, 'next_take', 'v012-3'],
  ] as const)('%s', (name, sha256, options, outcome, label) => expect(look(name, sha256, options)).toMatchObject({ outcome, label }));

  test('only files of a size that is there are worth a hash', () => {
    const files = [{ name: 'ox_v013.obj' }, { name: 'ox_v014.obj' }, { name: 'new_v001.obj' }, { name: 'new-v1.obj' }];
    const rows = planImport(files, null, known);
    expect(worthHashing([{ size: 7 }, { size: 8 }, { size: 5 }, { size: 5 }], rows, known)).toEqual([0, 2, 3]);
  });
});
