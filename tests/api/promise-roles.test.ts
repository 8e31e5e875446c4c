import { describe } from 'vitest';
import { POST as ask } from '@/app/api/v1/shows/[show]/approval-requests/route';
import { POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { POST as lockShots } from '@/app/api/v1/shows/[show]/lock-shots/route';
import { GET as outdated } from '@/app/api/v1/shows/[show]/outdated/route';
import { POST as relock } from '@/app/api/v1/shows/[show]/relocks/route';
import { GET as exportCsv } from '@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route';
import { GET as exportJson } from '@/app/api/v1/shows/[show]/shots/[shot]/export.json/route';
import { POST as lock } from '@/app/api/v1/shows/[show]/shots/[shot]/locks/route';
import { DELETE as dropOverride } from '@/app/api/v1/shows/[show]/shots/[shot]/overrides/[asset]/[part]/route';
import { POST as unlock } from '@/app/api/v1/shows/[show]/shots/[shot]/unlocks/route';
import { POST as putShots } from '@/app/api/v1/shows/[show]/shots/route';
import { POST as withdraw } from '@/app/api/v1/shows/[show]/withdrawals/route';
import { setValues } from '@/lib/settings/set-values';
import { eachCaller, type StatusOfCaller } from '../support/api';
import { approveBody, bodyNow, createCrateShow, lockBody, setDensity } from '../support/crate-show';

const TABLES = ['part_current', 'approvals', 'withdrawals', 'approval_requests', 'shots', 'shot_assets', 'locks', 'lock_claims', 'shot_overrides', 'receipts', 'audit_events', 'shows'];
const BODY = { asset: 'crate', part: 'body' };
const leads = (status: number): StatusOfCaller => ({ admin: status, lead: status, td: 403, artist: 403, guest: 404, outsider: 404, nobody: 401 });
const readers = (status: number): StatusOfCaller => ({ admin: status, lead: status, td: status, artist: status, guest: 404, outsider: 404, nobody: 401 });

describe('who may promise', () => {
  eachCaller('approve', approve, leads(201), TABLES, async (caller) => {
    const cast = await createCrateShow();
    return { params: { show: cast.show.code }, body: { items: [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }] }, token: cast.tokenOf(caller) };
  });

  eachCaller('take back', withdraw, leads(201), TABLES, async (caller) => {
    const cast = await createCrateShow();
    return { params: { show: cast.show.code }, body: { items: [{ value_id: await approveBody(cast) }], reason: 'too light' }, token: cast.tokenOf(caller) };
  });

  eachCaller('ask for approval', ask, { ...leads(201), td: 201 }, TABLES, async (caller) => {
    const cast = await createCrateShow();
    return { params: { show: cast.show.code }, body: { items: [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }], note: 'ready' }, token: cast.tokenOf(caller) };
  });

  eachCaller('list shots to be made', putShots, { ...leads(201), td: 201 }, TABLES, async (caller) => {
    const cast = await createCrateShow();
    return { params: { show: cast.show.code }, body: { items: [{ code: 'mil_0010', sequence: 'mil', assets: ['crate', 'crate'] }] }, token: cast.tokenOf(caller) };
  });

  eachCaller('lock', lock, leads(201), TABLES, async (caller) => {
    const cast = await createCrateShow();
    return { params: { show: cast.show.code, shot: 'fer_0010' }, body: { items: [{ ...BODY, value_id: await approveBody(cast) }] }, token: cast.tokenOf(caller) };
  });

  eachCaller('lock whole shots', lockShots, leads(201), TABLES, async (caller) => {
    const cast = await createCrateShow();
    await approveBody(cast);
    return { params: { show: cast.show.code }, body: { shots: ['fer_0010', 'fer_0020'] }, token: cast.tokenOf(caller) };
  });

  eachCaller('unlock', unlock, leads(200), TABLES, async (caller) => {
    const cast = await createCrateShow();
    const held = await lockBody(cast, await approveBody(cast));
    return { params: { show: cast.show.code, shot: 'fer_0010' }, body: { items: [{ lock: held }], reason: 'cut from the shot' }, token: cast.tokenOf(caller) };
  });

  eachCaller('re-lock', relock, leads(201), TABLES, async (caller) => {
    const cast = await createCrateShow();
    const held = await lockBody(cast, await approveBody(cast));
    await setDensity(cast, 2);
    return { params: { show: cast.show.code }, body: { items: [{ lock: held, value_id: await approveBody(cast) }], reason: 'heavier' }, token: cast.tokenOf(caller) };
  });

  eachCaller('drop an override', dropOverride, { ...readers(200) }, TABLES, async (caller) => {
    const cast = await createCrateShow();
    await setValues(cast.contextOf('artist'), { show: cast.show.code, items: [{ ...BODY, revision: 2, target_mass_kg: 5, shot: 'fer_0010', reason: 'light' }] });
    return { method: 'DELETE', params: { show: cast.show.code, shot: 'fer_0010', ...BODY }, query: { reason: 'not wanted' }, token: cast.tokenOf(caller) };
  });
});

describe('who may read what was promised', () => {
  eachCaller('what is out of date', outdated, readers(200), TABLES, async (caller) => {
    const cast = await createCrateShow();
    await lockBody(cast, await approveBody(cast));
    await setDensity(cast, 2);
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });

  for (const [format, handler] of [['CSV', exportCsv], ['JSON', exportJson]] as const) {
    eachCaller(`a shot as ${format}`, handler, readers(200), TABLES, async (caller) => {
      const cast = await createCrateShow();
      await lockBody(cast, await approveBody(cast));
      return { params: { show: cast.show.code, shot: 'fer_0010' }, token: cast.tokenOf(caller) };
    });
  }
});
