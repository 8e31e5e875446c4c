import { expect, test } from 'vitest';
import { byteWords } from '@/lib/rules/byte-words';
import { MENDS, mendOf } from '@/lib/rules/import-mends';
import { noteToModelling } from '@/lib/rules/import-note';
import { REPORT_SCHEMA, type ReportRow } from '@/lib/rules/import-report';

const LINK = 'http://127.0.0.1/x';

function row(file: string, changes: Partial<ReportRow> = {}): ReportRow {
  return {
    schema: REPORT_SCHEMA, show: 'tarn', import: 'i', file, sha256: '0'.repeat(64), bytes: 10, asset: 'ox', version: 'v001', take: 1, outcome: 'measured',
    part: null, severity: null, code: null, message: null, to_do: null, count: null, line: null, column: null, place: null, ...changes,
  };
}

const broken = row('set/bridge_v003.obj', { outcome: 'failed', severity: 'problem', code: 'vertex_out_of_range', message: 'Expected a vertex number.', line: 946, column: 15 });
const open = (file: string, part: string) => row(file, { part, severity: 'problem', code: 'open_border', message: '4 edges have one face only.' });

test('the note has every failure with its place, and what is wrong besides, under what mends it', () => {
  const note = noteToModelling('tarn', [row('fine.obj'), broken, open('rat.obj', 'tail'), row('crate.obj', { severity: 'warning', code: 'unit_too_large', message: 'More than 200 m.' })], LINK);
  expect(note).toContain('tarn: 3 files to look at');
  expect(note).toContain('set/bridge_v003.obj\n  line 946, column 15: Expected a vertex number.');
  expect(note).toContain('rat.obj\n  tail: 4 edges have one face only.');
  expect(note).toContain(MENDS.border.act);
  expect(note).toContain('crate.obj\n  More than 200 m.');
  expect(note).not.toContain('fine.obj');
  expect(note.trimEnd().endsWith(LINK)).toBe(true);
});

test('there is no note where nothing is wrong, nor for warnings that block no mass', () => {
  expect(noteToModelling('tarn', [row('fine.obj'), row('a.obj', { outcome: 'cancelled' }), row('b.obj', { severity: 'warning', code: 'gap', message: 'Versions are missing.' })], LINK)).toBe('');
});

test('hundreds of failures of one kind are one heading, with the rest counted', () => {
  const names = Array.from({ length: 300 }, (_, index) => `p${String(index).padStart(3, '0')}.obj`);
  const note = noteToModelling('tarn', [...names.map((name) => open(name, 'body')), broken], LINK);
  expect(note.split(MENDS.border.act)).toHaveLength(2);
  const named = names.filter((name) => note.includes(name)).length;
  expect(note).toContain(`and ${300 - named} more files, all in the report`);
  // The largest group comes first.
  expect(note.indexOf(MENDS.border.act)).toBeLessThan(note.indexOf(MENDS.content.act));
  expect(note.split('\n').length).toBeLessThan(120);
});

test('a file with many findings names the first and counts the rest', () => {
  const note = noteToModelling('tarn', ['a', 'b', 'c', 'd', 'e'].map((part) => open('ox.obj', part)), LINK);
  expect(note.split('\n').filter((line) => line === 'ox.obj')).toHaveLength(1);
  expect(note).toContain('  and 2 more');
});

test('what is not the file’s fault comes last, however much of it there is', () => {
  const ours = Array.from({ length: 5 }, (_, index) => row(`x${index}.obj`, { outcome: 'failed', severity: 'problem', code: 'gave_up', message: 'Reference 1.' }));
  const note = noteToModelling('tarn', [...ours, broken], LINK);
  expect(note.indexOf(MENDS.content.act)).toBeLessThan(note.indexOf(MENDS.ours.act));
});

test('a code that is not known, or is a word of the language, is among the others', () => {
  expect(mendOf('brand_new')).toBe('other');
  expect(mendOf('constructor')).toBe('other');
});

test.each([[0, '0 bytes'], [999, '999 bytes'], [1000, '1.0 kB'], [999_960, '1.0 MB'], [2 * 1024 ** 3, '2.1 GB'], [150_000_000, '150 MB']])('%i bytes are %s', (bytes, words) => {
  expect(byteWords(bytes)).toBe(words);
});
