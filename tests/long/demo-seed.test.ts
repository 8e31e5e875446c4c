import { existsSync } from 'node:fs';
import { expect, test } from 'vitest';
import { database } from '@/db/client';
import { seedDemo } from '@/db/seed/seed-demo';
import { config } from '@/lib/config';
import { rowsOf } from '../support/api';
import { asOwner } from '../support/database';

/** demo.md: 26 assets; the heavier ox is left to be dropped, the broken bridge fails, the rat's shin is inside out. */
test('the demo comes in by the real path, and a second time changes nothing', async () => {
  const report = await seedDemo(database(), config().dataFolder);
  expect(existsSync(report.toDrop)).toBe(true);
  expect(report.failed).toBe(1);
  expect(report.massesSet).toBeGreaterThan(100);
  expect(await asOwner('select count(*)::int as assets from assets')).toEqual([{ assets: 26 }]);
  expect(await asOwner(`select name, error_line is not null as placed from import_files where state = 'failed'`)).toEqual([{ name: 'set/bridge/bridge_v003.obj', placed: true }]);
  const current = await asOwner<{ asset: string; version: string }>(`select distinct asset, version from part_current where asset in ('tarnOx', 'bridge', 'millRat') order by asset`);
  expect(current).toEqual([{ asset: 'bridge', version: 'v002' }, { asset: 'millRat', version: 'v002' }, { asset: 'tarnOx', version: 'v012' }]);
  expect(await asOwner(`select asset, part from part_current where state = 'blocked'`)).toEqual([{ asset: 'millRat', part: 'shin_R' }]);
  const left = await asOwner<{ unset: number }>(`select count(*)::int as unset from part_current where asset = 'tarnOx' and state = 'unset'`);
  expect(left[0].unset).toBeGreaterThan(10);
  const tables = ['shows', 'users', 'members', 'materials', 'imports', 'import_files', 'assets', 'asset_versions', 'settings', 'part_current', 'audit_events', 'mails'];
  const before = await rowsOf(...tables);
  expect(await seedDemo(database(), config().dataFolder)).toMatchObject({ files: 0, massesSet: 0 });
  expect(await rowsOf(...tables)).toBe(before);
});
