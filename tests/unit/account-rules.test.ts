import { describe, expect, test } from 'vitest';
import { cookieOf } from '@/lib/auth/session-cookie';
import { contentPolicy } from '@/lib/http/content-policy';
import { escapeHtml } from '@/lib/mail/message';
import { emailField, showCodeField } from '@/lib/rules/fields';
import { formatBytes } from '@/lib/rules/format-bytes';
import { isTheEmail, passwordField } from '@/lib/rules/password-rule';
import { safePath } from '@/lib/rules/safe-path';
import { signInRefusal } from '@/lib/rules/sign-in-refusal';
import { splitWords } from '@/lib/rules/split-words';
import { nameFromEmail } from '@/lib/users/name-from-email';

describe('a path to lead back to', () => {
  test.each(['/shows', '/shows/tarn?state=unset&q=a%20b', '/shows/tarn#row-3', '/shows/täler'])('%s stays within this site', (path) => {
    const led = new URL(safePath(path), 'https://weighhouse.example');
    expect(led.origin).toBe('https://weighhouse.example');
    expect(led.href).toBe(new URL(path, 'https://weighhouse.example').href);
  });

  test.each([
    null,
    undefined,
    '',
    'shows',
    'https://elsewhere.example/',
    '//elsewhere.example',
    '/\\elsewhere.example',
    '\\\\elsewhere.example',
    '/\t/elsewhere.example',
    '/\n/elsewhere.example',
    'javascript:alert(1)',
    '/.//elsewhere.example',
    '/a/..//elsewhere.example',
    '/sign-in?callbackUrl=/sign-in',
  ])('%j leads to the shows', (path) => {
    expect(safePath(path)).toBe('/shows');
  });
});

describe('a password', () => {
  test('has at least ten characters', () => {
    expect(passwordField.safeParse('123456789').success).toBe(false);
    expect(passwordField.safeParse('1234567890').success).toBe(true);
  });

  test.each([
    ['odrun@oxbarrow.example', true],
    [' ODRUN@Oxbarrow.Example ', true],
    ['odrun', true],
    ['odrun@oxbarrow.example!', false],
  ])('%s is the e-mail: %s', (password, is) => {
    expect(isTheEmail(password, 'Odrun@oxbarrow.example')).toBe(is);
  });
});

test('an e-mail address is trimmed and lowered, and no list of addresses', () => {
  expect(emailField.parse('  Odrun@Oxbarrow.Example ')).toBe('odrun@oxbarrow.example');
  for (const wrong of ['', 'odrun', 'a@b@c', 'a b@c', 'a@b c', `${'x'.repeat(250)}@y.zz`]) expect(emailField.safeParse(wrong).success).toBe(false);
});

test('a show’s code is what the database takes', () => {
  for (const good of ['tarn', 'T2', '9_a-b', 'x'.repeat(32)]) expect(showCodeField.safeParse(good).success).toBe(true);
  for (const wrong of ['', '-a', '_a', 'a b', 'a/b', 'ä', 'x'.repeat(33)]) expect(showCodeField.safeParse(wrong).success).toBe(false);
});

test('a refused sign-in says only what we know to say', () => {
  expect(signInRefusal('CredentialsSignin')).toBe('E-mail or password is wrong.');
  expect(signInRefusal(`too_many_attempts:${Date.UTC(2026, 0, 1, 12, 0, 5)}`)).toMatch(/^Too many attempts for this address\. Try again at \d\d:\d\d:05\.$/);
  for (const odd of ['Call 555 now', 'too_many_attempts:<b>', '', null, undefined]) expect(signInRefusal(odd)).toBe('Signing in did not work. Try again.');
});

test('words are parted by commas, semicolons and white space, each once', () => {
  expect(splitWords(' a@b, c@d;\n e@f a@b ,, ')).toEqual(['a@b', 'c@d', 'e@f']);
  expect(splitWords('  ')).toEqual([]);
});

test('a name to begin with comes from the address', () => {
  expect(nameFromEmail('ilvo.brackmere@oxbarrow.example')).toBe('Ilvo Brackmere');
  expect(nameFromEmail('__@x')).not.toBe('');
});

test('one cookie is found among others', () => {
  const header = 'a=1; weighhouse-session=x=y; b=2';
  expect(cookieOf(header, 'weighhouse-session')).toBe('x=y');
  expect(cookieOf(header, 'session')).toBeNull();
  expect(cookieOf(null, 'a')).toBeNull();
});

test('scripts run by nonce alone, and no page of ours in another’s frame', () => {
  const policy = contentPolicy('abc', true);
  expect(policy).toContain(`script-src 'self' 'nonce-abc' 'strict-dynamic';`);
  expect(policy).toContain(`frame-ancestors 'none'`);
  expect(policy).not.toMatch(/unsafe-eval|https?:|ws:/);
  expect(contentPolicy('abc', false)).toContain(`'unsafe-eval'`);
});

test('HTML has no way out of a text', () => {
  expect(escapeHtml(`<a href="x">&</a>`)).toBe('&lt;a href=&quot;x&quot;&gt;&amp;&lt;/a&gt;');
});

test.each([
  [0, '0 B'],
  [999, '999 B'],
  [1000, '1 kB'],
  [999_499, '999 kB'],
  [999_500, '1 MB'],
  [1_234_567, '1.23 MB'],
  [77e9, '77 GB'],
])('%d bytes read as %s', (bytes, text) => {
  expect(formatBytes(bytes)).toBe(text);
});
