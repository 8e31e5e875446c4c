import Papa from 'papaparse';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parseAssetsInShot, parseShotList } from '@/lib/rules/parse-shot-list';

const bare = (text: string) => parseShotList(text).shots.map(({ code, sequence, assets }) => [sequence, code, ...assets.map((one) => `${one.asset}*${one.copies}`)]);
const placesOf = (text: string) => parseShotList(text).errors.map(({ line, column }) => [line, column]);

describe('a list of shots', () => {
  test.each([
    ['tabs, as a spreadsheet copies them', 'fer\tfer_0010\ttarnOx\nfer\tfer_0020\tsledge\t2\n'],
    ['commas', 'fer,fer_0010,tarnOx\r\nfer,fer_0020,sledge,2\r\n'],
    ['semicolons', 'fer;fer_0010;tarnOx;\nfer;fer_0020;sledge;2'],
    ['a byte order mark and old line ends', '\uFEFFfer,fer_0010,tarnOx\rfer,fer_0020,sledge,2'],
    ['headings in another order', 'Copies,Shot,Sequence,Asset\n,fer_0010,fer,tarnOx\n2,fer_0020,fer,sledge'],
    ['headings of other words', 'seq\tcode\tassets\tcount\nfer\tfer_0010\ttarnOx\t\nfer\tfer_0020\tsledge\t2'],
    ['quotes and empty lines', '\n"fer","fer_0010","tarnOx"\n\n,,,\nfer, fer_0020 ,sledge, 2 \n'],
  ])('is read with %s', (_name, text) => {
    expect(parseShotList(text).errors).toEqual([]);
    expect(bare(text)).toEqual([
      ['fer', 'fer_0010', 'tarnOx*1'],
      ['fer', 'fer_0020', 'sledge*2'],
    ]);
  });

  test('puts the lines of one shot together, whatever the case of its code, and keeps their numbers', () => {
    const { shots, errors } = parseShotList('fer,fer_0010,tarnOx\nfer,FER_0010,"lantern 3, oar"\nmil,mil_0010,\n');
    expect(errors).toEqual([]);
    expect(shots).toEqual([
      { code: 'fer_0010', sequence: 'fer', lines: [1, 2], assets: [{ asset: 'tarnOx', copies: 1 }, { asset: 'lantern', copies: 3 }, { asset: 'oar', copies: 1 }] },
      { code: 'mil_0010', sequence: 'mil', lines: [3], assets: [] },
    ]);
  });

  test('counts lines through cells that run over several', () => {
    const { shots, errors } = parseShotList('fer,fer_0010,"tarnOx\nlantern 2"\nfer,fer 0020,oar\n');
    expect(shots[0].assets).toEqual([{ asset: 'tarnOx', copies: 1 }, { asset: 'lantern', copies: 2 }]);
    expect(errors.map(({ line, column }) => [line, column])).toEqual([[3, 2]]);
  });

  test.each([
    ['no sequence', ',fer_0010,tarnOx', [[1, 1]]],
    ['no shot', 'fer', [[1, 2]]],
    ['codes with what a code cannot hold', 'fe r,-0010,tarnOx', [[1, 1], [1, 2]]],
    ['copies that are no count', 'fer,fer_0010,tarnOx,two\nfer,fer_0020,tarnOx,0\nfer,fer_0030,tarnOx,201\nfer,fer_0040,tarnOx,1.5', [[1, 4], [2, 4], [3, 4], [4, 4]]],
    ['copies behind an asset beyond the most', 'fer,fer_0010,tarnOx 900', [[1, 3]]],
    ['a shot in two sequences', 'fer,a_10,tarnOx\nmil,a_10,oar', [[2, 1]]],
    ['an asset twice in a shot', 'fer,a_10,oar\nfer,a_10,oar\nfer,a_20,oar oar', [[2, 3], [3, 3]]],
    ['too many columns', 'fer,a_10,oar,1,2', [[1, 5]]],
    ['a heading of nothing here', 'sequence,shot,frames\nfer,a_10,100', [[1, 3]]],
    ['a heading twice', 'sequence,shot,shot\nfer,a_10,a_20', [[1, 3]]],
    ['a quotation mark that is not closed', 'fer,a_10,oar\nfer,a_20,"oar', [[2, 0]]],
  ])('names the place of %s', (_name, text, places) => {
    expect(placesOf(text)).toEqual(places);
    for (const { message } of parseShotList(text).errors) expect(message).toMatch(/\S.*\.$/);
  });

  test('holds nothing where there is nothing', () => {
    for (const text of ['', ' \n\n', '\uFEFF', 'sequence,shot']) expect(parseShotList(text)).toEqual({ shots: [], errors: [] });
  });

  test('reads back any list that a spreadsheet writes', () => {
    const code = fc.stringMatching(/^[a-z]_[a-z0-9_]{2,8}$/);
    const asset = fc.tuple(code, fc.integer({ min: 1, max: 200 }));
    const shot = fc.record({ code, assets: fc.uniqueArray(asset, { selector: ([name]) => name, minLength: 1, maxLength: 4 }) });
    const list = fc.uniqueArray(shot, { selector: (one) => one.code, minLength: 1, maxLength: 8 });
    fc.assert(
      fc.property(list, fc.constantFrom(',', '\t', ';'), fc.boolean(), fc.boolean(), (shots, delimiter, header, quotes) => {
        const rows = shots.flatMap((one) => one.assets.map(([name, copies]) => ['seq_a', one.code, name, String(copies)]));
        const text = Papa.unparse(header ? [['sequence', 'shot', 'assets', 'copies'], ...rows] : rows, { delimiter, quotes });
        const read = parseShotList(text);
        expect(read.errors).toEqual([]);
        expect(read.shots.map(({ code: name, assets }) => ({ code: name, assets: assets.map((one) => [one.asset, one.copies]) }))).toEqual(shots);
      }),
    );
  });
});

describe('the assets of one cell', () => {
  test.each([
    ['tarnOx', [['tarnOx', 1]]],
    ['tarnOx lantern 3 oar', [['tarnOx', 1], ['lantern', 3], ['oar', 1]]],
    ['tarnOx; lantern x3', [['tarnOx', 1], ['lantern', 3]]],
    ['tarnOx,lantern ×12', [['tarnOx', 1], ['lantern', 12]]],
    ['007 2', [['007', 2]]],
    ['', []],
  ])('%o', (text, assets) => {
    const read = parseAssetsInShot(text);
    expect(typeof read === 'string' ? read : read.map((one) => [one.asset, one.copies])).toEqual(assets);
  });

  test('take the copies of their line where they say none', () => {
    expect(parseAssetsInShot('oar lantern 3', 2)).toEqual([{ asset: 'oar', copies: 2 }, { asset: 'lantern', copies: 3 }]);
  });
});
