import { describe, expect, test } from 'vitest';
import { database } from '@/db/client';
import { POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { GET as exportCsv } from '@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route';
import { POST as lock } from '@/app/api/v1/shows/[show]/shots/[shot]/locks/route';
import { POST as withdraw } from '@/app/api/v1/shows/[show]/withdrawals/route';
import { withdrawApprovals } from '@/lib/approvals/withdraw-approvals';
import { approveValues } from '@/lib/approvals/approve-values';
import { listOutdated } from '@/lib/locks/list-outdated';
import { unlockValues } from '@/lib/locks/unlock-values';
import { setValues } from '@/lib/settings/set-values';
import { disableUser } from '@/lib/users/disable-user';
import { refreshAssetValues } from '@/lib/values/refresh-asset-values';
import { call, expectProblem, rowsOf, type Answer } from '../support/api';
import { addMember, createUser, type Cast, type Person } from '../support/cast';
import { approveBody, bodyNow, createCrateShow, lockBody, putCrate, setDensity } from '../support/crate-show';
import { asOwner } from '../support/database';
import { boxPart, putCage } from '../support/put-cage';

const BODY = { asset: 'crate', part: 'body' };
const show = (cast: Cast) => ({ show: cast.show.code });
const pull = (cast: Cast, shot = 'fer_0010', token = cast.tokenOf('artist')): Promise<Answer> => call(exportCsv, { params: { ...show(cast), shot }, token });
const approveAs = (cast: Cast, who: Person, items: object[]) => call(approve, { params: show(cast), body: { items }, token: cast.tokenOf(who) });
const outdatedOf = async (cast: Cast) => (await listOutdated(cast.contextOf('artist'), show(cast))).items;

describe('an approval that a live lock uses', () => {
  test('is not taken back: the shots are listed; after the unlock it is', async () => {
    const cast = await createCrateShow();
    const value = await approveBody(cast);
    const held = [await lockBody(cast, value, 'fer_0010'), await lockBody(cast, value, 'fer_0020')];
    const before = await rowsOf('approvals', 'withdrawals', 'locks', 'part_current');
    const refused = expectProblem(await call(withdraw, { params: show(cast), body: { items: [{ value_id: value }], reason: 'wrong' }, token: cast.tokenOf('lead') }), 409, 'conflict');
    expect(refused.errors).toMatchObject([{ code: 'locked', message: expect.stringContaining('fer_0010, fer_0020') as string }]);
    expect(await rowsOf('approvals', 'withdrawals', 'locks', 'part_current')).toBe(before);
    for (const [i, shot] of ['fer_0010', 'fer_0020'].entries()) await unlockValues(cast.contextOf('lead'), { ...show(cast), shot, items: [{ lock: held[i] }], reason: 'wrong' });
    await withdrawApprovals(cast.contextOf('lead'), { ...show(cast), items: [{ value_id: value }], reason: 'wrong' });
    expect(await bodyNow(cast)).toMatchObject({ state: 'measured', valueId: null });
  });
});

describe('the setter', () => {
  test('is whoever changed an input since the last approval, and no longer after it', async () => {
    const cast = await createCrateShow();
    await setValues(cast.contextOf('lead'), { ...show(cast), items: [{ ...BODY, revision: 2, density_kg_m3: 3 }] });
    const own = expectProblem(await approveAs(cast, 'lead', [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }]), 422, 'bad_input');
    expect(own.errors).toMatchObject([{ code: 'own_value' }]);
    expect((await approveAs(cast, 'admin', [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }])).status).toBe(201);
    await setDensity(cast, 4);
    expect((await approveAs(cast, 'lead', [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }])).status).toBe(201);
  });

  test('is the importer of a version, too; an admin is no exception', async () => {
    const cast = await createCrateShow();
    await approveBody(cast);
    await putCage(cast.show, cast.people.admin, 'crate', [boxPart('body', [0, 0, 0], [5, 3, 4])]);
    const refused = expectProblem(await approveAs(cast, 'admin', [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }]), 422, 'bad_input');
    expect(refused.errors).toMatchObject([{ code: 'own_value' }]);
    expect((await approveAs(cast, 'lead', [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }])).status).toBe(201);
  });

  test('approves where the show says so', async () => {
    const cast = await createCrateShow();
    await setValues(cast.contextOf('lead'), { ...show(cast), items: [{ ...BODY, revision: 2, density_kg_m3: 3 }] });
    await asOwner('update shows set self_approval = true where id = $1', [cast.show.id]);
    expect((await approveAs(cast, 'lead', [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }])).status).toBe(201);
  });
});

describe('a new version', () => {
  test('changes no lock: its bytes stay, and the lock is listed with the differences', async () => {
    const cast = await createCrateShow();
    await lockBody(cast, await approveBody(cast));
    const promised = await pull(cast);
    await putCrate(cast, 4);
    expect((await pull(cast)).text).toBe(promised.text);
    expect(await bodyNow(cast)).toMatchObject({ state: 'outdated', massKg: 48 });
    const [stale] = await outdatedOf(cast);
    // A box of twice the width: twice the mass, its centre 1 m on along x of a box whose diagonal is √29 m.
    expect(stale).toMatchObject({ shot: 'fer_0010', why: 'changed', beyond_tolerance: true, locked: { version: 'v001', mass_kg: 24 }, current: { version: 'v002', mass_kg: 48, value_id: null } });
    expect(stale.differences?.mass_change).toBeCloseTo(1, 14);
    expect(stale.differences?.com_shift_m).toEqual([1, 0, 0]);
    expect(stale.differences?.com_shift_of_size).toBeCloseTo(1 / Math.sqrt(29), 14);
  });

  test('without the part lists its locks as absent; they stand', async () => {
    const cast = await createCrateShow();
    await lockBody(cast, await approveBody(cast));
    const promised = await pull(cast);
    await putCage(cast.show, cast.people.td, 'crate', [boxPart('lid', [10, 0, 0], [11, 1, 1])]);
    expect((await pull(cast)).text).toBe(promised.text);
    expect(await outdatedOf(cast)).toMatchObject([{ why: 'absent', current: null, state: null, beyond_tolerance: true }]);
  });

  test('that brings back the approved geometry is approved again by the approval that stands', async () => {
    const cast = await createCrateShow();
    const value = await approveBody(cast);
    await putCrate(cast, 4);
    expect(await bodyNow(cast)).toMatchObject({ state: 'outdated', valueId: null });
    await asOwner(
      `insert into asset_versions (asset_id, number, label, record_id, created_by)
       select asset_id, 3, 'v003', record_id, created_by from asset_versions where number = 1 and asset_id = (select asset_id from part_current where part_id = $1)`,
      [(await bodyNow(cast)).partId],
    );
    const [{ asset_id: assetId }] = await asOwner<{ asset_id: string }>('select asset_id from part_current where part_id = $1', [(await bodyNow(cast)).partId]);
    await database().transaction((tx) => refreshAssetValues(tx, { assetId, importedBy: cast.people.td.id }));
    expect(await bodyNow(cast)).toMatchObject({ state: 'approved', valueId: value });
  });

  test('whose approval is taken back leaves the part out of date while an older approval stands', async () => {
    const cast = await createCrateShow();
    await approveBody(cast);
    await setDensity(cast, 7);
    const newer = await approveBody(cast);
    await withdrawApprovals(cast.contextOf('lead'), { ...show(cast), items: [{ value_id: newer }], reason: 'too heavy' });
    expect(await bodyNow(cast)).toMatchObject({ state: 'outdated', valueId: null });
  });
});

describe('a part that is left out', () => {
  test('has no value to approve, and its locks stand', async () => {
    const cast = await createCrateShow();
    const value = await approveBody(cast);
    await lockBody(cast, value);
    const promised = await pull(cast);
    await setValues(cast.contextOf('td'), { ...show(cast), items: [{ ...BODY, revision: (await bodyNow(cast)).revision, left_out: true }] });
    expect((await pull(cast)).text).toBe(promised.text);
    expect(await outdatedOf(cast)).toMatchObject([{ why: 'no_value', state: 'left_out', current: { mass_kg: null } }]);
    const refused = expectProblem(await approveAs(cast, 'lead', [{ ...BODY, value_sha256: 'a'.repeat(64) }]), 422, 'bad_input');
    expect(refused.errors).toMatchObject([{ code: 'no_value' }]);
  });
});

describe('people who go', () => {
  test('leave approvals, locks and receipts behind', async () => {
    const cast = await createCrateShow();
    await lockBody(cast, await approveBody(cast));
    const promised = await pull(cast);
    await addMember(cast.show, await createUser(), 'lead');
    await disableUser(cast.contextOf('admin'), { email: cast.people.lead.email });
    await disableUser(cast.contextOf('admin'), { email: cast.people.td.email });
    expect((await pull(cast)).text).toBe(promised.text);
    await expect(asOwner('delete from users where id = $1', [cast.people.lead.id])).rejects.toThrow(/violates foreign key/);
    await expect(asOwner('delete from assets where show_id = $1', [cast.show.id])).rejects.toThrow(/violates foreign key/);
  });
});

describe('a guest', () => {
  test('pulls what is locked in the shots or assets named, and nothing else', async () => {
    const cast = await createCrateShow();
    await putCage(cast.show, cast.people.td, 'lamp', [boxPart('body', [0, 0, 0], [1, 1, 1])]);
    const value = await approveBody(cast);
    await lockBody(cast, value, 'fer_0010');
    await lockBody(cast, value, 'fer_0020');
    const [ofShot, ofAsset, ofOther] = await Promise.all([createUser(), createUser(), createUser()]);
    await addMember(cast.show, ofShot, 'guest', { shots: ['fer_0010'] });
    await addMember(cast.show, ofAsset, 'guest', { assets: ['crate'] });
    await addMember(cast.show, ofOther, 'guest', { assets: ['lamp'] });
    const all = await pull(cast);
    expect((await pull(cast, 'fer_0010', ofShot.token)).text).toBe(all.text);
    expectProblem(await pull(cast, 'fer_0020', ofShot.token), 404, 'not_found');
    expect((await pull(cast, 'fer_0010', ofAsset.token)).text).toBe(all.text);
    expect((await pull(cast, 'fer_0010', ofOther.token)).text.split('\r\n')).toHaveLength(2);
  });
});

describe('two writers', () => {
  test('one value that changed fails the whole call, with the items listed', async () => {
    const cast = await createCrateShow();
    await setValues(cast.contextOf('td'), { ...show(cast), items: [{ asset: 'crate', part: 'lid', revision: 1, density_kg_m3: 1 }] });
    const [lid] = await asOwner<{ sha: string }>(`select value_sha256 as sha from part_current where show_id = $1 and part = 'lid'`, [cast.show.id]);
    const seen = (await bodyNow(cast)).valueSha256;
    await setDensity(cast, 9);
    const refused = expectProblem(await approveAs(cast, 'lead', [{ asset: 'crate', part: 'lid', value_sha256: lid.sha }, { ...BODY, value_sha256: seen }]), 409, 'conflict', 'items.1');
    expect(refused.errors).toMatchObject([{ index: 1, code: 'changed_meanwhile' }]);
    expect(await asOwner('select id from approvals where show_id = $1', [cast.show.id])).toEqual([]);
  });

  test('approving twice keeps one approval, locking twice one lock; another value is refused', async () => {
    const cast = await createCrateShow();
    const value = await approveBody(cast);
    expect(await approveBody(cast)).toBe(value);
    const held = await lockBody(cast, value);
    expect(await lockBody(cast, value)).toBe(held);
    await setDensity(cast, 2);
    const other = await approveBody(cast);
    const refused = expectProblem(await call(lock, { params: { ...show(cast), shot: 'fer_0010' }, body: { items: [{ ...BODY, value_id: other }] }, token: cast.tokenOf('lead') }), 409, 'conflict');
    expect(refused.errors).toMatchObject([{ code: 'already_locked' }]);
  });

  test('an Idempotency-Key answers the first answer again', async () => {
    const cast = await createCrateShow();
    const send = async () => call(approve, { params: show(cast), body: { items: [{ ...BODY, value_sha256: 'f'.repeat(64) }] }, token: cast.tokenOf('lead'), headers: { 'idempotency-key': 'bad' } });
    expectProblem(await send(), 409, 'conflict');
    const body = { items: [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }] };
    const once = () => call(approve, { params: show(cast), body, token: cast.tokenOf('lead'), headers: { 'idempotency-key': 'once' } });
    const first = await once();
    const again = await once();
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(again.json).toEqual(first.json);
    expect(again.headers.get('idempotent-replayed')).toBe('true');
  });
});

describe('carrying over', () => {
  test('approves what moved less than the tolerance, and refuses the rest by name', async () => {
    const cast = await createCrateShow();
    await approveBody(cast);
    await setDensity(cast, 1.004);
    const carried = await approveValues(cast.contextOf('lead'), { ...show(cast), items: [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }], carry_over: true });
    expect(carried.items).toHaveLength(1);
    const [row] = await asOwner<{ carried_from: string | null }>('select carried_from from approvals where id = $1', [carried.items[0].value_id]);
    expect(row.carried_from).not.toBeNull();
    await setDensity(cast, 1.1);
    const refused = expectProblem(await call(approve, { params: show(cast), body: { items: [{ ...BODY, value_sha256: (await bodyNow(cast)).valueSha256 }], carry_over: true }, token: cast.tokenOf('lead') }), 422, 'bad_input');
    expect(refused.errors).toMatchObject([{ code: 'beyond_tolerance' }]);
  });
});

describe('an archived show', () => {
  test('takes no approval and no lock, and still hands out what was locked', async () => {
    const cast = await createCrateShow();
    const value = await approveBody(cast);
    await lockBody(cast, value);
    const promised = await pull(cast);
    await asOwner('update shows set archived_at = now() where id = $1', [cast.show.id]);
    expectProblem(await approveAs(cast, 'lead', [{ ...BODY, value_sha256: 'a'.repeat(64) }]), 409, 'frozen');
    expectProblem(await call(lock, { params: { ...show(cast), shot: 'fer_0020' }, body: { items: [{ ...BODY, value_id: value }] }, token: cast.tokenOf('lead') }), 409, 'frozen');
    expect((await pull(cast)).text).toBe(promised.text);
  });
});
