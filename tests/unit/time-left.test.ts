import { expect, test } from 'vitest';
import { secondsLeft, timeLeftWords } from '@/lib/rules/time-left';

test('the time left is what is left at the pace of what was done', () => {
  // 30 MB in 60 s leave 20 s for 10 MB.
  expect(secondsLeft({ seconds: 60, files: 30, work: 30e6, left: 10e6 })).toBe(20);
});

test('twice the work left takes twice the time, twice the pace half of it', () => {
  const pace = { seconds: 40, files: 20, work: 8e6, left: 4e6 };
  const left = secondsLeft(pace)!;
  expect(secondsLeft({ ...pace, left: 8e6 })).toBe(2 * left);
  expect(secondsLeft({ ...pace, work: 16e6 })).toBe(left / 2);
});

test.each([
  ['few files have ended', { seconds: 60, files: 4, work: 1e6, left: 1e6 }],
  ['it began a moment ago', { seconds: 2, files: 50, work: 1e6, left: 1e6 }],
  ['nothing has ended lately', { seconds: 100, files: 0, work: 0, left: 1e6 }],
])('nothing is said while %s', (_why, pace) => {
  expect(secondsLeft(pace)).toBeNull();
});

test.each([[3, 'less than a minute left'], [61, 'about 1 min left'], [250, 'about 4 min left'], [1_700, 'about 30 min left'], [3_580, 'about 1 h left'], [4_800, 'about 1 h 20 min left']])('%i s are said as %s', (seconds, words) => {
  expect(timeLeftWords(seconds)).toBe(words);
});
