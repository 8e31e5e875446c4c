import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { expect, test } from 'vitest';
import { GET as getHealth } from '@/app/api/health/route';
import { GET as getReady } from '@/app/api/health/ready/route';
import { config } from '@/lib/config';
import { pauseImport } from '@/lib/imports/pause-import';
import { submitImport } from '@/lib/imports/submit-import';
import { cubeObj } from '../support/cages';
import { createCast } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith } from '../support/imports';

test('liveness answers without a token', async () => {
  const answer = getHealth();
  expect(answer.status).toBe(200);
  expect(await answer.json()).toEqual({ status: 'ok' });
});

test('readiness tries database, storage and queue, and tells nothing else', async () => {
  const answer = await getReady();
  expect(answer.status).toBe(200);
  expect(await answer.json()).toEqual({ status: 'ready', database: 'ok', storage: 'ok', queue: 'ok', oldest_waiting_job_s: null });
});

test('the oldest waiting job gives the age', async () => {
  await asOwner(`select pgboss.create_queue('waits', '{}')`);
  await asOwner(`insert into pgboss.job (name, created_on, start_after) values
    ('waits', now() - interval '90 seconds', now() - interval '90 seconds'),
    ('waits', now() - interval '5 seconds', now() - interval '5 seconds'),
    ('waits', now() - interval '500 seconds', now() + interval '1 hour')`);
  const { oldest_waiting_job_s: age } = await (await getReady()).json();
  expect(age).toBeGreaterThanOrEqual(90);
  expect(age).toBeLessThan(120);
});

test('files that wait count though no job stands for them; paused ones and those put off do not', async () => {
  await asOwner(`delete from pgboss.job`);
  const cast = await createCast();
  const id = await openWith(cast.contextOf('td'), cast.show.code, { 'a.obj': cubeObj(), 'b.obj': cubeObj({ size: 3 }) });
  await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  await asOwner(`delete from pgboss.job`);
  await asOwner(`update import_files set queued_at = now() - interval '300 seconds' where import_id = $1`, [id]);
  const age = async () => (await (await getReady()).json()).oldest_waiting_job_s as number | null;
  expect(await age()).toBeGreaterThanOrEqual(300);
  await asOwner(`update import_files set try_after = now() + interval '1 hour' where import_id = $1`, [id]);
  expect(await age()).toBeNull();
  await asOwner(`update import_files set try_after = null where import_id = $1`, [id]);
  await pauseImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  expect(await age()).toBeNull();
});

test('a folder that takes no bytes is 503, without its path', async () => {
  const { filesFolder } = config();
  rmSync(filesFolder, { recursive: true, force: true });
  writeFileSync(filesFolder, 'a file where the folder should be');
  try {
    const answer = await getReady();
    expect(answer.status).toBe(503);
    const text = await answer.text();
    expect(JSON.parse(text)).toMatchObject({ status: 'down', database: 'ok', storage: 'down', queue: 'ok' });
    expect(text).not.toContain(path.dirname(filesFolder));
  } finally {
    rmSync(filesFolder);
    mkdirSync(filesFolder);
  }
});
