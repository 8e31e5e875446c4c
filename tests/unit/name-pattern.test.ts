import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { compareInProcessingOrder, planImport, versionLabel } from '@/lib/rules/import-plan';
import { previewImport } from '@/lib/rules/import-preview';
import type { KnownAsset } from '@/lib/rules/known-asset';
import { categoryOfFolder, checkNamePattern, readName, readNameBuiltIn, splitPath, takeVersion } from '@/lib/rules/name-pattern';

describe('the built-in rule', () => {
  test.each([
    ['tarnOx_v012.obj', 'tarnOx', 12],
    ['tarnOx.v012.obj', 'tarnOx', 12],
    ['tarnOx-v12.obj', 'tarnOx', 12],
    ['tarnOxv012.obj', 'tarnOx', 12],
    ['tarnOx_V3.OBJ', 'tarnOx', 3],
    ['tarnOx_v012_final.obj', 'tarnOx_final', 12],
    ['tarnOx.obj', 'tarnOx', null],
    ['v012.obj', null, 12],
    ['ox/v012.obj', 'ox', 12],
    ['ox/v012/ox.obj', 'ox', 12],
    ['ox_v4/mesh.obj', 'mesh', 4],
    ['ox_v4/mesh_v7.obj', 'mesh', 7],
    ['valve.obj', 'valve', null],
    ['v8_engine.obj', 'engine', 8],
    ['tarnOx.v012', 'tarnOx', 12],
    ['heron hag_v002.obj', 'heron hag', 2],
    ['a_v01_v02.obj', 'a_v01', 2],
  ])('%s', (path, asset, version) => {
    const read = readNameBuiltIn(path);
    if (asset === null) expect(read).toBeNull();
    else expect(read).toMatchObject({ asset, version });
  });

  test.each([
    ['creatures/ox.obj', 'creature'],
    ['show/PROPS/sub/ox.obj', 'prop'],
    ['costume/creature/ox.obj', 'creature'],
    ['sets/arch.obj', 'set'],
    ['vehicle/raft.obj', 'vehicle'],
    ['assets/ox.obj', 'other'],
  ])('the category of %s is %s', (path, category) => expect(readNameBuiltIn(path)?.category).toBe(category));

  test('a version token is found behind any name that ends in no digit and letter of its own', () => {
    const stem = fc.stringMatching(/^[A-Za-z][A-Za-z0-9]{0,12}[a-uw-z]$/).filter((name) => !/v\d/i.test(name));
    fc.assert(
      fc.property(stem, fc.integer({ min: 0, max: 99_999 }), fc.constantFrom('_v', '.v', '-v', '_V'), fc.boolean(), (name, number, token, padded) => {
        const read = readNameBuiltIn(`props/${name}${token}${padded ? String(number).padStart(3, '0') : number}.obj`);
        expect(read).toEqual({ asset: name, category: 'prop', version: number });
      }),
    );
  });

  test('no name makes it throw, and an asset is never empty nor a path', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 60 }), (path) => {
        const read = readNameBuiltIn(path);
        if (read === null) return;
        expect(read.asset).not.toBe('');
        expect(read.asset).not.toMatch(/[/\\]/);
      }),
    );
  });

  test('steps upwards in a path are dropped', () => {
    expect(splitPath('../../etc/./ox.obj')).toEqual({ folders: ['etc'], file: 'ox.obj' });
    expect(splitPath('a\\b\\ox.obj')).toEqual({ folders: ['a', 'b'], file: 'ox.obj' });
  });

  test('a token inside a word is no version', () => {
    expect(takeVersion('curve2')).toEqual({ rest: 'curve2', version: null });
    expect(takeVersion('nav2')).toEqual({ rest: 'nav2', version: null });
    expect(takeVersion('nav2mesh')).toEqual({ rest: 'nav2mesh', version: null });
    expect(categoryOfFolder('settings')).toBeNull();
  });
});

describe('a pattern of the show', () => {
  test.each([
    ['{category}/{asset}_v{version}', 'work/creatures/ox_v012.obj', { asset: 'ox', category: 'creature', version: 12 }],
    ['{asset}/publish/v{version}/*', 'x/ox/publish/v003/mesh.obj', { asset: 'ox', category: 'other', version: 3 }],
    ['{asset}.{version}', 'props/hook.0007.obj', { asset: 'hook', category: 'prop', version: 7 }],
    ['{asset}', 'props/hook_v2.obj', { asset: 'hook_v2', category: 'prop', version: null }],
    ['TRN_{asset}_{version}', 'trn_ox_12.obj', { asset: 'ox', category: 'other', version: 12 }],
  ])('%s reads %s', (pattern, path, expected) => {
    expect(checkNamePattern(pattern)).toBeNull();
    expect(readName(path, pattern)).toEqual(expected);
  });

  test('a name that does not match is said', () => expect(readName('ox.obj', '{asset}_v{version}')).toBeNull());

  test.each([
    ['', /empty/],
    ['{asset}{version}', /touch/],
    ['{version}', /needs \{asset\}/],
    ['{asset}_{asset}', /twice/],
    ['{asset}_{take}', /\{take\} is not known/],
    ['{asset', /brace/],
    ['../{asset}', /no \. or \.\./],
    ['*{asset}*_*-*.*', /stars/],
    [`{asset}${'x'.repeat(300)}`, /longer/],
  ])('%s is refused with a sentence', (pattern, sentence) => expect(checkNamePattern(pattern)).toMatch(sentence));

  test('characters of regular expressions mean themselves', () => {
    expect(readName('a+b(c)_ox.obj', 'a+b(c)_{asset}')).toMatchObject({ asset: 'ox' });
    expect(readName('aab(c)_ox.obj', 'a+b(c)_{asset}')).toBeNull();
    expect(readName('x.y_v1.obj', '{asset}.y_v{version}')).toMatchObject({ asset: 'x', version: 1 });
    expect(readName('xzy_v1.obj', '{asset}.y_v{version}')).toBeNull();
  });

  test('any pattern is either refused or can be used on any name', () => {
    const piece = fc.constantFrom('{asset}', '{version}', '{category}', '*', '_', '/', 'v', '.', '(', '[', '\\', '$', '{', '}');
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 12 }), fc.string({ maxLength: 30 }), (pieces, path) => {
        const pattern = pieces.join('');
        if (checkNamePattern(pattern) === null) expect(() => readName(path, pattern)).not.toThrow();
      }),
    );
  });
});

describe('a batch', () => {
  const named = (...names: string[]) => names.map((name) => ({ name }));
  const assetsOf = (...names: string[]) => planImport(named(...names), null).map((file) => file.asset);

  test('one file name in two folders is two assets', () => {
    expect(assetsOf('props/hook.obj', 'costumes/hook.obj')).toEqual(['props_hook', 'costumes_hook']);
    expect(assetsOf('a/x/hook.obj', 'b/x/hook.obj')).toEqual(['a_x_hook', 'b_x_hook']);
    expect(assetsOf('hook.obj', 'b/hook.obj')).toEqual(['hook', 'b_hook']);
  });

  test('folders that only tell versions apart make no second asset', () => {
    expect(assetsOf('ox/v012/ox.obj', 'ox/v013/ox.obj')).toEqual(['ox', 'ox']);
    expect(assetsOf('creatures/ox_v012.obj', 'old/ox_v011.obj')).toEqual(['ox', 'ox']);
  });

  test('all versions of a contested name are told apart alike', () => {
    expect(assetsOf('a/ox_v001.obj', 'a/ox_v002.obj', 'b/ox_v001.obj')).toEqual(['a_ox', 'a_ox', 'b_ox']);
  });

  test('what the sender says is never changed', () => {
    const plan = planImport([{ name: 'a/hook.obj', asset: 'hook' }, { name: 'b/hook.obj' }], null);
    expect(plan.map((file) => file.asset)).toEqual(['hook', 'hook']);
    expect(plan.some((file) => file.qualified)).toBe(false);
  });

  test('the outcome does not depend on the order of the files, and no two files that differ in folder alone share asset and version', () => {
    const name = fc.tuple(fc.constantFrom('', 'a/', 'b/', 'props/', 'a/props/', 'v002/'), fc.constantFrom('ox', 'hook'), fc.constantFrom('', '_v001', '_v002')).map((steps) => `${steps.join('')}.obj`);
    fc.assert(
      fc.property(fc.uniqueArray(name, { maxLength: 12 }), (names) => {
        const forth = planImport(named(...names), null);
        const back = planImport(named(...names.toReversed()), null).toReversed();
        expect(back).toEqual(forth);
        const places = forth.filter((file) => !file.name.includes('v002/')).map((file) => `${file.asset} ${file.version}`);
        expect(new Set(places).size).toBe(places.length);
      }),
    );
  });
});

describe('the preview', () => {
  const known: KnownAsset[] = [
    { asset: 'ox', category: 'creature', versions: [11, 12, 12] },
    { asset: 'bell', category: 'prop', versions: [3] },
  ];
  const look = (...names: string[]) => previewImport(names.map((name) => ({ name })), null, known);

  test.each([
    ['ox_v013.obj', 'new_version', 'v013', null],
    ['ox_v012.obj', 'next_take', 'v012-3', /v012 exists/],
    ['ox_v015.obj', 'new_version', 'v015', /between v012 and v015/],
    ['ox_v010.obj', 'new_version', 'v010', /stays the current/],
    ['ox.obj', 'new_version', 'v013', /no version/],
    ['heron.obj', 'new_asset', 'v001', null],
    ['Bell_v004.obj', 'new_asset', 'v004', /upper and lower case/],
  ] as const)('%s is %s %s', (name, outcome, label, warning) => {
    const [row] = look(name);
    expect(row).toMatchObject({ outcome, label });
    if (warning === null) expect(row.warnings).toEqual([]);
    else expect(row.warnings.join(' ')).toMatch(warning);
  });

  test('files of one batch count for one another', () => {
    const rows = look('toad_v002.obj', 'toad_v001.obj', 'toad-v2.obj');
    expect(rows.map((row) => [row.outcome, row.label])).toEqual([
      ['next_take', 'v002-2'],
      ['new_asset', 'v001'],
      ['new_version', 'v002'],
    ]);
    expect(rows[0].warnings.join(' ')).toMatch(/Two files of this drop/);
  });

  test('a name outside the pattern has no asset', () => {
    const [row] = previewImport([{ name: 'notes.obj' }], '{asset}_v{version}', known);
    expect(row).toMatchObject({ asset: null, outcome: 'unmatched', label: null });
  });

  test('files are taken up by asset, then number, those without one last', () => {
    const files = planImport([{ name: 'ox.obj' }, { name: 'ox_v10.obj' }, { name: 'ox_v9.obj' }, { name: 'bell.obj' }], null);
    expect(files.toSorted(compareInProcessingOrder).map((file) => file.name)).toEqual(['bell.obj', 'ox_v9.obj', 'ox_v10.obj', 'ox.obj']);
  });

  test('labels', () => expect([versionLabel(12, 1), versionLabel(12, 2), versionLabel(1234, 1)]).toEqual(['v012', 'v012-2', 'v1234']));
});
