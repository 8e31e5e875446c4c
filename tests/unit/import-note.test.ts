import { expect, test } from 'vitest';
import { mergeImport } from '@/hooks/use-import-live';
import { byteWords } from '@/lib/rules/byte-words';
import type { ImportDetail, ImportFileAnswer } from '@/lib/rules/import-answer';
import { noteToModelling } from '@/lib/rules/import-note';

function file(name: string, changes: Partial<ImportFileAnswer> = {}): ImportFileAnswer {
  return { name, state: 'done', asset: 'ox', version: 'v001', parts: 1, problems: 0, remarks: [], size_m: [1, 2, 3], sha256: '0'.repeat(64), bytes: 10, error: null, ...changes };
}

const broken = file('set/bridge_v003.obj', { state: 'failed', asset: null, version: null, error: { code: 'vertex_out_of_range', message: 'Expected a vertex number.', line: 946, column: 15 } });

test('the note has every failure with its place, and what is wrong besides', () => {
  const note = noteToModelling('tarn', [file('fine.obj'), broken, file('rat.obj', { problems: 2, asset: 'rat' }), file('crate.obj', { remarks: ['unit_too_large'], size_m: [600, 10, 10] })], 'http://127.0.0.1/x');
  expect(note).toContain('set/bridge_v003.obj\n  line 946, column 15: Expected a vertex number.');
  expect(note).toContain('rat.obj\n  2 problems in rat v001');
  expect(note).toMatch(/crate\.obj\n {2}600 m/);
  expect(note).not.toContain('fine.obj');
  expect(note.endsWith('http://127.0.0.1/x\n')).toBe(true);
});

test('there is no note where nothing is wrong, nor for what somebody cancelled', () => {
  const cancelled = file('a.obj', { state: 'failed', error: { code: 'cancelled', message: 'Cancelled.', line: null, column: null } });
  expect(noteToModelling('tarn', [file('fine.obj'), cancelled], 'http://127.0.0.1/x')).toBe('');
});

test('an event changes the files it names and keeps the others', () => {
  const known = { id: 'i', state: 'running', files: [file('b.obj', { state: 'queued' }), file('a.obj')] } as ImportDetail;
  const merged = mergeImport(known, { ...known, state: 'done', files: [broken, file('b.obj')] });
  expect(merged.state).toBe('done');
  expect(merged.files.map((one) => [one.name, one.state])).toEqual([['a.obj', 'done'], ['b.obj', 'done'], ['set/bridge_v003.obj', 'failed']]);
});

test.each([[0, '0 bytes'], [999, '999 bytes'], [1000, '1.0 kB'], [999_960, '1.0 MB'], [2 * 1024 ** 3, '2.1 GB'], [150_000_000, '150 MB']])('%i bytes are %s', (bytes, words) => {
  expect(byteWords(bytes)).toBe(words);
});
