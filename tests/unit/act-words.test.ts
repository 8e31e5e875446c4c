import { expect, test } from 'vitest';
import { actWords, changeWords, fieldWords } from '@/lib/rules/act-words';

test('a lock and an override name their shot', () => {
  expect(fieldWords('lock fer_0010')).toBe('lock in fer_0010');
  expect(fieldWords('lock fer_0010 2')).toBe('lock in fer_0010, copy 2');
  expect(fieldWords('mil_0020: target_mass_kg')).toBe('target mass, kg in mil_0020');
  expect(fieldWords('mil_0020: override')).toBe('override in mil_0020');
});

test('what is yes or no is said so, and nothing else is', () => {
  expect(changeWords('mil_0020: left_out', 'true')).toBe('yes');
  expect(changeWords('told', 'false')).toBe('no');
  expect(changeWords('title', 'true')).toBe('true');
});

test.each(['approve-values', 'carry-over', 'withdraw-approvals', 'ask-for-approval', 'take-question-back', 'put-shots', 'remove-from-shot', 'lock-values', 'unlock-values', 'draft-override', 'drop-override', 'set-told'])('%s has words of its own', (act) => {
  expect(actWords(act)).not.toBe(act.replaceAll('-', ' '));
});
