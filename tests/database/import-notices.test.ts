import { afterAll, beforeEach, describe, expect, test } from 'vitest';
import { asOwner } from '../support/database';
import { readMail } from '../support/mail-text';
import { startSmtp } from '../support/smtp';

// The mail server has to be set before lib/config is read.
const smtp = await startSmtp();
process.env.SMTP_URL = smtp.url;
const { database } = await import('@/db/client');
const { GET: exportShot } = await import('@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route');
const { approveValues } = await import('@/lib/approvals/approve-values');
const { retryImport } = await import('@/lib/imports/retry-import');
const { drainQueue } = await import('@/lib/jobs/drain-queue');
const { tellImportHandler } = await import('@/lib/jobs/handlers/tell-import');
const { lockShots } = await import('@/lib/locks/lock-shots');
const { sendWaitingMails } = await import('@/lib/mail/send-waiting-mails');
const { setTold } = await import('@/lib/notices/set-told');
const { setValues } = await import('@/lib/settings/set-values');
const { putShots } = await import('@/lib/shots/put-shots');
const { call } = await import('../support/api');
const { createCast } = await import('../support/cast');
const { boxesObj } = await import('../support/cages');
const { importFiles, ownThread } = await import('../support/imports');
type Cast = Awaited<ReturnType<typeof createCast>>;

afterAll(() => smtp.close());
beforeEach(() => {
  smtp.taken.length = 0;
});

async function delivered(): Promise<Map<string, { subject: string; text: string }[]>> {
  for (let round = 0; round < 2; round++) await Promise.all([sendWaitingMails(database()), sendWaitingMails(database())]);
  const byPerson = new Map<string, { subject: string; text: string }[]>();
  for (const mail of smtp.taken.splice(0)) byPerson.set(mail.to[0], [...(byPerson.get(mail.to[0]) ?? []), readMail(mail)]);
  return byPerson;
}

const bring = (cast: Cast, files: Record<string, string>) => importFiles(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral' });

interface Row extends Record<string, unknown> {
  asset: string;
  part: string;
  revision: number;
  value_sha256: string;
}
const rowsNow = (cast: Cast) => asOwner<Row>('select asset, part, revision, value_sha256 from part_current where show_id = $1 order by asset, part', [cast.show.id]);

/**
 * A show in metres: ox v001 of a body of 24 m³ and a horn of 1 m³ at 10 kg/m³, and a rope, all approved; the ox locked by the lead in
 * fer_0010 and fer_0020, the rope in none; the artist took fer_0010.
 */
async function createOxShow(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await bring(cast, { 'ox_v001.obj': boxesObj({ body: [2, 3, 4], horn: [1, 1, 1] }), 'rope_v001.obj': boxesObj({ rope: [1, 1, 5] }) });
  await setValues(cast.contextOf('td'), { show: cast.show.code, items: (await rowsNow(cast)).map(({ asset, part, revision }) => ({ asset, part, revision, density_kg_m3: 10 })) });
  await approveValues(cast.contextOf('lead'), { show: cast.show.code, items: (await rowsNow(cast)).map(({ asset, part, value_sha256 }) => ({ asset, part, value_sha256 })), note: '', carry_over: false });
  await putShots(cast.contextOf('lead'), { show: cast.show.code, items: ['fer_0010', 'fer_0020'].map((code) => ({ code, sequence: 'fer', assets: ['ox'] })) });
  await lockShots(cast.contextOf('lead'), { show: cast.show.code, shots: ['fer_0010', 'fer_0020'] });
  const answer = await call(exportShot, { params: { show: cast.show.code, shot: 'fer_0010' }, token: cast.people.artist.token });
  expect(answer.status, answer.text).toBe(200);
  await delivered();
  return cast;
}

/** Of the body: 9 % more volume by 9 % more length. */
const HEAVIER = boxesObj({ body: [2, 3, 4.36], horn: [1, 1, 1] });

describe('a new version', () => {
  test('tells once who took and who locked the values, with the verdict and the shots out of date', async () => {
    const cast = await createOxShow();
    const { id } = await bring(cast, { 'ox_v002.obj': HEAVIER });
    await Promise.all([1, 2, 3].map(() => tellImportHandler(database(), { importId: id, since: null })));
    const mails = await delivered();
    expect([...mails.keys()].sort()).toEqual([cast.people.artist.email, cast.people.lead.email].sort());
    const [toArtist, ...more] = mails.get(cast.people.artist.email)!;
    const [toLead, ...others] = mails.get(cast.people.lead.email)!;
    expect([...more, ...others]).toEqual([]);
    expect(toArtist.subject).toBe(`ox v002: 1 part changed, 2 shots out of date (${cast.show.title})`);
    // The centre of a box 0.36 m longer along z moves by half of that; its size is √(2² + 3² + 4²) m.
    expect(toArtist.text).toContain('- ox/body: +9 %, 180 mm along +z (3.3 % of its size), against 240.0 kg (v001), locked in fer_0010 and fer_0020');
    expect(toArtist.text).toContain(`${cast.people.td.name} imported ox v002 into ${cast.show.title}.`);
    expect(toArtist.text).toContain(`/shows/${cast.show.code}/shots?state=outdated`);
    expect(toArtist.text).not.toContain('horn');
    expect(toLead.text).toContain('because you took or locked these values');
  });

  test('within the tolerance tells nobody, nor does the same file again', async () => {
    const cast = await createOxShow();
    await setTold(cast.contextOf('admin'), { show: cast.show.code, told: true });
    // 0.4 % heavier, its centre 8 mm off in 5.4 m; the tolerances are 0.5 %, 0.5 % and 1 %, its inertia about the short axes grows by less.
    await bring(cast, { 'ox_v002.obj': boxesObj({ body: [2, 3, 4.016], horn: [1, 1, 1] }) });
    await bring(cast, { 'ox_v002.obj': boxesObj({ body: [2, 3, 4.016], horn: [1, 1, 1] }) });
    const outdated = await asOwner(`select 1 from part_current where show_id = $1 and state = 'outdated' and part = 'body'`, [cast.show.id]);
    expect(outdated).toHaveLength(1);
    expect([...(await delivered())]).toEqual([]);
  });

  test('tells who asked for the show, the asset or a shot; what is only approved too, and a part that is gone', async () => {
    const cast = await createOxShow();
    await setTold(cast.contextOf('admin'), { show: cast.show.code, asset: 'rope', told: true });
    await setTold(cast.contextOf('td'), { show: cast.show.code, told: true });
    await bring(cast, { 'ox_v002.obj': boxesObj({ body: [2, 3, 4] }), 'rope_v002.obj': boxesObj({ rope: [1, 1, 6] }) });
    const mails = await delivered();
    // The td imported it.
    expect([...mails.keys()].sort()).toEqual([cast.people.admin.email, cast.people.artist.email, cast.people.lead.email].sort());
    const [ofRope] = mails.get(cast.people.admin.email)!;
    expect(ofRope.subject).toBe(`rope v002: 1 part changed (${cast.show.title})`);
    expect(ofRope.text).toMatch(/- rope\/rope: \+20 %.*against 50\.00 kg \(v001\) \(approved\)/);
    expect(ofRope.text).not.toContain('ox');
    const [ofOx] = mails.get(cast.people.artist.email)!;
    expect(ofOx.text).toContain('- ox/horn: not in the current version, against 10.00 kg (v001), locked in fer_0010 and fer_0020');
    expect(ofOx.text).not.toContain('rope');
  });

  test('is told with its failed files when those are tried again, and only of those', async () => {
    const cast = await createOxShow();
    await setTold(cast.contextOf('lead'), { show: cast.show.code, told: true });
    // Of a size that no other test has measured.
    let away = true;
    const engine: typeof ownThread = { measure: (file, onMeasuring) => (away && file.name.startsWith('rope') ? Promise.resolve({ ok: false, code: 'unreadable', message: 'cannot be read', line: null, column: null, excerpt: null }) : ownThread.measure(file, onMeasuring)) };
    const { openWith } = await import('../support/imports');
    const { submitImport } = await import('@/lib/imports/submit-import');
    const id = await openWith(cast.contextOf('td'), cast.show.code, { 'ox_v002.obj': HEAVIER, 'rope_v002.obj': boxesObj({ rope: [1, 1, 7] }) }, { scheme: 'polyhedral' });
    await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    await drainQueue(database(), engine);
    expect((await delivered()).get(cast.people.lead.email)!.map((mail) => mail.subject)).toEqual([`ox v002: 1 part changed, 2 shots out of date (${cast.show.title})`]);
    away = false;
    await retryImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    await drainQueue(database(), engine);
    const again = await delivered();
    expect(again.get(cast.people.lead.email)!.map((mail) => mail.subject)).toEqual([`rope v002: 1 part changed (${cast.show.title})`]);
    expect(again.has(cast.people.artist.email)).toBe(false);
  });
});
