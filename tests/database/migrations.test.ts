import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { asOwner } from '../support/database';

const folder = fileURLToPath(new URL('../../drizzle', import.meta.url));
type Journal = { entries: { idx: number; when: number; tag: string }[] };
const journal = JSON.parse(readFileSync(`${folder}/meta/_journal.json`, 'utf8')) as Journal;

// The migrator compares only the newest timestamp: an entry with an older one would be skipped without a word.
test('the journal counts up and its times strictly increase', () => {
  expect(journal.entries.length).toBeGreaterThan(0);
  journal.entries.forEach((entry, index) => {
    expect(entry.idx).toBe(index);
    if (index > 0) expect(entry.when, entry.tag).toBeGreaterThan(journal.entries[index - 1].when);
  });
});

test('every SQL file is in the journal, and every entry has its file', () => {
  const files = readdirSync(folder).filter((name) => name.endsWith('.sql'));
  expect(files.sort()).toEqual(journal.entries.map((entry) => `${entry.tag}.sql`).sort());
});

test('the cloned database holds every migration of the journal', async () => {
  const rows = await asOwner<{ created_at: string }>('select created_at from drizzle.__drizzle_migrations order by created_at');
  expect(rows.map((row) => Number(row.created_at))).toEqual(journal.entries.map((entry) => entry.when));
});
