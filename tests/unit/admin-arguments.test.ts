import { expect, test } from 'vitest';
import { parseOrder } from '@/lib/run/admin-arguments';

test('each command becomes one order', () => {
  expect(parseOrder(['user', 'add', 'a@b.example', '--name', 'A B', '--admin'])).toEqual({ verb: 'user add', input: { email: 'a@b.example', name: 'A B', admin: true } });
  expect(parseOrder(['user', 'disable', 'a@b.example'])).toEqual({ verb: 'user disable', input: { email: 'a@b.example' } });
  expect(parseOrder(['token', 'add', '--user', 'a@b.example', '--name', 'farm', '--days', '30'])).toEqual({
    verb: 'token add',
    input: { user: 'a@b.example', name: 'farm', days: 30 },
  });
  expect(parseOrder(['token', 'revoke', 'x'])).toEqual({ verb: 'token revoke', input: { id: 'x' } });
  expect(parseOrder(['member', 'set', 'tarn', 'a@b.example', 'lead'])).toEqual({ verb: 'member set', input: { show: 'tarn', email: 'a@b.example', role: 'lead' } });
  expect(parseOrder(['storage', 'check', '--deep'])).toEqual({ verb: 'storage check', input: { deep: true, mend: false } });
});

test.each([
  [[], /^Usage/],
  [['user'], /no command "user"/],
  [['constructor', 'x'], /no command/],
  [['user', 'add', 'a@b.example'], /needs --name/],
  [['user', 'add', '--name', 'A'], /takes one word, not 0/],
  [['user', 'disable', 'a@b.example', '--admin'], /has no --admin/],
  [['member', 'set', 'tarn', 'a@b.example'], /takes 3 words, not 2/],
  [['token', 'add', '--user', 'a@b.example', '--name'], /--name/],
  [['token', 'add', '--user', 'a', '--name', 'b', '--days', 'soon'], /--days takes a whole number/],
  [['token', 'revoke', 'x', '--quick'], /Unknown option '--quick'/],
])('%j is answered with the reason and the usage', (argv, reason) => {
  const answer = parseOrder(argv);
  expect(answer).toHaveProperty('usage');
  expect((answer as { usage: string }).usage).toMatch(reason);
  expect((answer as { usage: string }).usage).toContain('npm run --silent admin');
});
