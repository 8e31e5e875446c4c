import { expect, test } from 'vitest';
import { BOUNDARIES, CREASING_RULES, PARTITIONS, SCHEMES, TRIANGLE_RULES } from '@/lib/engine/cage';
import { BOUNDARY_WORDS, CREASING_WORDS, PARTITION_WORDS, SCHEME_WORDS, TRIANGLE_WORDS } from '@/lib/rules/measure-words';

test.each([
  ['scheme', SCHEMES, SCHEME_WORDS],
  ['boundary', BOUNDARIES, BOUNDARY_WORDS],
  ['triangles', TRIANGLE_RULES, TRIANGLE_WORDS],
  ['creasing', CREASING_RULES, CREASING_WORDS],
  ['parts by', PARTITIONS, PARTITION_WORDS],
])('engine and database know the same words for %s', (_, engine, words) => {
  expect([...words]).toEqual([...engine]);
});
