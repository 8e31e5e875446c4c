import { afterAll, beforeEach, describe, expect, test } from 'vitest';
import { asOwner } from '../support/database';
import { readMail } from '../support/mail-text';
import { refusal, startSmtp } from '../support/smtp';

// The mail server has to be set before lib/config is read.
const smtp = await startSmtp();
process.env.SMTP_URL = smtp.url;
const { database } = await import('@/db/client');
const { GET: exportShot } = await import('@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route');
const { askForApproval } = await import('@/lib/approvals/ask-for-approval');
const { approveValues } = await import('@/lib/approvals/approve-values');
const { withdrawApprovals } = await import('@/lib/approvals/withdraw-approvals');
const { relockValues } = await import('@/lib/locks/relock-values');
const { unlockValues } = await import('@/lib/locks/unlock-values');
const { sendWaitingMails } = await import('@/lib/mail/send-waiting-mails');
const { sendDigests } = await import('@/lib/notices/send-digests');
const { setTold } = await import('@/lib/notices/set-told');
const { tellPeople } = await import('@/lib/notices/tell-people');
const { setMailChoice } = await import('@/lib/users/set-mail-choice');
const { setValues } = await import('@/lib/settings/set-values');
const { call } = await import('../support/api');
const { addMember, createUser } = await import('../support/cast');
const { approveBody, bodyNow, createCrateShow, lockBody, setDensity } = await import('../support/crate-show');
type Cast = Awaited<ReturnType<typeof createCrateShow>>;
type Person = Parameters<Cast['contextOf']>[0];

const BODY = { asset: 'crate', part: 'body' };
const TEXT = { subject: 'Something', lines: ['Somebody did something.'], list: [], label: 'Open it', path: '/shows', why: 'You are told because you asked to be.' };

afterAll(() => smtp.close());
beforeEach(async () => {
  await asOwner('update notices set mail_id = null; delete from notices; delete from mails');
  smtp.taken.length = 0;
  smtp.onMessage = () => undefined;
});

/** Sends as two workers do, twice; what the server took, by address. */
async function delivered(): Promise<Map<string, { subject: string; text: string }[]>> {
  for (let round = 0; round < 2; round++) await Promise.all([sendWaitingMails(database()), sendWaitingMails(database())]);
  const byPerson = new Map<string, { subject: string; text: string }[]>();
  for (const mail of smtp.taken) byPerson.set(mail.to[0], [...(byPerson.get(mail.to[0]) ?? []), readMail(mail)]);
  return byPerson;
}

const told = async (cast: Cast): Promise<string[]> => {
  const taken = await delivered();
  return [...taken].flatMap(([email, mails]) => mails.map(() => Object.entries(cast.people).find(([, user]) => user.email === email)?.[0] ?? email)).sort();
};

async function pull(cast: Cast, who: Person, shot = 'fer_0010'): Promise<void> {
  const answer = await call(exportShot, { params: { show: cast.show.code, shot }, token: cast.people[who].token });
  expect(answer.status, answer.text).toBe(200);
}

const unlock = (cast: Cast, lock: string, who: Person = 'lead') => unlockValues(cast.contextOf(who), { show: cast.show.code, shot: 'fer_0010', items: [{ lock }], reason: 'cut from the shot' });
const ask = (cast: Cast, who: Person, place: { shot?: string; asset?: string } = {}) => setTold(cast.contextOf(who), { show: cast.show.code, told: true, ...place });
const choose = (cast: Cast, who: Person, choice: 'at_once' | 'daily' | 'none') => setMailChoice(cast.contextOf(who), { choice });

describe('an unlock', () => {
  test('tells those who took the values and those who asked, once each, with the reason, and not who did it', async () => {
    const cast = await createCrateShow();
    const lock = await lockBody(cast, await approveBody(cast));
    for (const who of ['artist', 'lead'] as const) await pull(cast, who);
    await pull(cast, 'artist');
    await ask(cast, 'td', { shot: 'fer_0010' });
    await ask(cast, 'td');
    await ask(cast, 'lead');
    await unlock(cast, lock);
    const mails = await delivered();
    expect([...mails.keys()].sort()).toEqual([cast.people.artist.email, cast.people.td.email].sort());
    const [mail, ...more] = mails.get(cast.people.artist.email)!;
    expect(more).toEqual([]);
    expect(mail.subject).toBe(`crate/body unlocked in fer_0010 (${cast.show.title})`);
    expect(mail.text.split('\n\n')).toEqual([
      `Hello ${cast.people.artist.name},`,
      `${cast.people.lead.name} unlocked crate/body in fer_0010 of ${cast.show.title}.`,
      'Reason: cut from the shot',
      '- fer_0010: crate/body was locked to 24.00 kg (v001)',
      `Open fer_0010:\nhttp://127.0.0.1:3000/shows/${cast.show.code}/shots/fer_0010`,
      'You are told because you took these values. What mail you get is your choice: http://127.0.0.1:3000/account',
    ]);
    expect(mails.get(cast.people.td.email)![0].text).toContain('because you asked to be');
  });

  test('tells of the asset that somebody asked for, and not of another shot', async () => {
    const cast = await createCrateShow();
    const lock = await lockBody(cast, await approveBody(cast));
    await ask(cast, 'artist', { asset: 'crate' });
    await ask(cast, 'td', { shot: 'fer_0020' });
    await unlock(cast, lock);
    expect(await told(cast)).toEqual(['artist']);
  });

  test('tells a guest who took the values only while they are invited there', async () => {
    const cast = await createCrateShow();
    const lock = await lockBody(cast, await approveBody(cast));
    const invited = await createUser();
    await addMember(cast.show, invited, 'guest', { shots: ['FER_0010'] });
    const gone = await createUser();
    await addMember(cast.show, gone, 'guest', { assets: ['crate'] });
    for (const { token } of [invited, gone]) expect((await call(exportShot, { params: { show: cast.show.code, shot: 'fer_0010' }, token })).status).toBe(200);
    await asOwner(`update members set assets = '{}' where user_id = $1`, [gone.id]);
    await unlock(cast, lock);
    const mails = await delivered();
    expect([...mails.keys()]).toEqual([invited.email]);
    expect(mails.get(invited.email)![0].text).toContain('Open Weighhouse:\nhttp://127.0.0.1:3000/shows\n');
  });

  test('of a rolled-back call tells nobody', async () => {
    const cast = await createCrateShow();
    const lock = await lockBody(cast, await approveBody(cast));
    await pull(cast, 'artist');
    await expect(unlockValues(cast.contextOf('lead'), { show: cast.show.code, shot: 'fer_0020', items: [{ lock }], reason: 'cut' })).rejects.toMatchObject({ code: 'bad_input' });
    expect(await told(cast)).toEqual([]);
  });

  test('a mail server that says "not now" gets it again, once', async () => {
    const cast = await createCrateShow();
    const lock = await lockBody(cast, await approveBody(cast));
    await pull(cast, 'artist');
    await unlock(cast, lock);
    smtp.onMessage = () => {
      throw refusal(451, 'Busy, try later');
    };
    expect(await sendWaitingMails(database())).toMatchObject({ sent: 0, waiting: 1 });
    smtp.onMessage = () => undefined;
    expect(await told(cast)).toEqual(['artist']);
  });
});

test('a re-lock tells what it was and what it is', async () => {
  const cast = await createCrateShow();
  const lock = await lockBody(cast, await approveBody(cast));
  await pull(cast, 'artist');
  await setDensity(cast, 2);
  await relockValues(cast.contextOf('lead'), { show: cast.show.code, items: [{ lock, value_id: await approveBody(cast) }], reason: 'heavier wood' });
  const [mail, ...more] = (await delivered()).get(cast.people.artist.email)!;
  expect(more).toEqual([]);
  expect(mail.subject).toBe(`crate/body re-locked in fer_0010 (${cast.show.title})`);
  expect(mail.text).toContain('- fer_0010: crate/body was 24.00 kg (v001), is 48.00 kg (v001) now');
  expect(mail.text).toContain('Reason: heavier wood');
});

describe('approvals', () => {
  test('a question tells the leads, one message an act; its approval tells who asked', async () => {
    const cast = await createCrateShow();
    const second = await createUser();
    await addMember(cast.show, second, 'lead');
    const { valueSha256 } = await bodyNow(cast);
    await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'crate', part: 'lid', revision: 1, density_kg_m3: 5 }] });
    const [lid] = await asOwner<{ value_sha256: string }>(`select value_sha256 from part_current where show_id = $1 and part = 'lid'`, [cast.show.id]);
    const items = [{ ...BODY, value_sha256: valueSha256 }, { asset: 'crate', part: 'lid', value_sha256: lid.value_sha256 }];
    await askForApproval(cast.contextOf('td'), { show: cast.show.code, items, note: 'both weighed', take_back: false });
    const asked = await delivered();
    expect([...asked.keys()].sort()).toEqual([cast.people.lead.email, second.email].sort());
    const [question, ...more] = asked.get(second.email)!;
    expect(more).toEqual([]);
    expect(question.subject).toBe(`${cast.people.td.name} asks for approval of 2 values (${cast.show.title})`);
    expect(question.text).toContain('Note: both weighed\n\n- crate/body\n- crate/lid');
    smtp.taken.length = 0;
    await approveValues(cast.contextOf('lead'), { show: cast.show.code, items, note: 'good', carry_over: false });
    const given = await delivered();
    expect([...given.keys()]).toEqual([cast.people.td.email]);
    const [answer, ...others] = given.get(cast.people.td.email)!;
    expect(others).toEqual([]);
    expect(answer.subject).toBe(`2 values approved (${cast.show.title})`);
    expect(answer.text).toContain('Note: good\n\n- crate/body: 24.00 kg (v001)\n- crate/lid: 5.000 kg (v001)');
  });

  test('what nobody asked for tells nobody; what is taken back tells who set it', async () => {
    const cast = await createCrateShow();
    const value = await approveBody(cast);
    expect(await told(cast)).toEqual([]);
    await withdrawApprovals(cast.contextOf('lead'), { show: cast.show.code, items: [{ value_id: value }], reason: 'too light' });
    const mails = await delivered();
    expect([...mails.keys()]).toEqual([cast.people.td.email]);
    expect(mails.get(cast.people.td.email)![0]).toMatchObject({ subject: `Approval of crate/body taken back (${cast.show.title})`, text: expect.stringContaining('Reason: too light') as string });
  });

  test('the approval of an override tells who drafted it', async () => {
    const cast = await createCrateShow();
    await setValues(cast.contextOf('artist'), { show: cast.show.code, items: [{ ...BODY, revision: 2, target_mass_kg: 5, shot: 'fer_0010', reason: 'light' }] });
    const [draft] = await asOwner<{ value_sha256: string }>('select o.value_sha256 from shot_overrides o join shots s on s.id = o.shot_id where s.show_id = $1', [cast.show.id]);
    await approveValues(cast.contextOf('lead'), { show: cast.show.code, items: [{ ...BODY, shot: 'fer_0010', value_sha256: draft.value_sha256 }], note: '', carry_over: false });
    const mails = await delivered();
    expect([...mails.keys()]).toEqual([cast.people.artist.email]);
    expect(mails.get(cast.people.artist.email)![0].subject).toBe(`crate/body in fer_0010 approved (${cast.show.title})`);
  });
});

describe('who is told, and how', () => {
  test('at once, with the digest, or not at all, as they chose', async () => {
    const cast = await createCrateShow();
    const lock = await lockBody(cast, await approveBody(cast));
    await choose(cast, 'artist', 'daily');
    await choose(cast, 'td', 'none');
    for (const who of ['artist', 'td', 'admin'] as const) await ask(cast, who);
    await unlock(cast, lock);
    expect(await told(cast)).toEqual(['admin']);
    expect(await asOwner('select mail_id from notices where user_id = $1', [cast.people.artist.id])).toEqual([{ mail_id: null }]);
    expect(await asOwner('select 1 from notices where user_id = $1', [cast.people.td.id])).toEqual([]);
  });

  test('one key tells once, however many tell it at the same time', async () => {
    const cast = await createCrateShow();
    const tell = () => database().transaction((tx) => tellPeople(tx, { showId: cast.show.id, actorId: cast.people.lead.id, key: 'once', tellings: [{ userIds: [cast.people.artist.id, cast.people.td.id], text: TEXT }] }));
    const counts = await Promise.all([tell(), tell(), tell()]);
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(2);
    expect(await told(cast)).toEqual(['artist', 'td']);
  });

  test('nobody who is disabled, left the show, or was never in it', async () => {
    const cast = await createCrateShow();
    await asOwner('update users set disabled_at = now() where id = $1', [cast.people.artist.id]);
    await asOwner('delete from members where user_id = $1', [cast.people.td.id]);
    const userIds = [cast.people.artist.id, cast.people.td.id, cast.people.outsider.id];
    expect(await database().transaction((tx) => tellPeople(tx, { showId: cast.show.id, actorId: cast.people.lead.id, key: 'gone', tellings: [{ userIds, text: TEXT }] }))).toBe(0);
    expect(await told(cast)).toEqual([]);
  });
});

describe('the digest', () => {
  const at = (day: number, time: string) => new Date(`2026-03-0${day}T${time}Z`);

  /** Something that the person waits for, of that moment. */
  async function waiting(cast: Cast, who: Person, key: string, moment: Date): Promise<void> {
    await database().transaction((tx) => tellPeople(tx, { showId: cast.show.id, actorId: cast.people.lead.id, key, tellings: [{ userIds: [cast.people[who].id], text: { ...TEXT, subject: `Subject ${key}`, lines: [`Line of ${key}.`] } }] }));
    await asOwner('update notices set created_at = $2 where key = $1', [key, moment]);
  }

  test('goes out once a day at its hour, with everything of every show, however many workers there are', async () => {
    const cast = await createCrateShow();
    const other = await createCrateShow();
    await addMember(other.show, cast.people.artist, 'artist');
    await choose(cast, 'artist', 'daily');
    await waiting(cast, 'artist', 'first', at(1, '12:00:00'));
    await waiting(cast, 'artist', 'second', at(1, '13:00:00'));
    await waiting({ ...other, people: cast.people }, 'artist', 'third', at(2, '06:59:00'));
    expect(await sendDigests(database(), at(1, '23:00:00'))).toBe(0);
    expect(await sendDigests(database(), at(2, '06:59:59'))).toBe(0);
    const counts = await Promise.all([1, 2, 3, 4].map(() => sendDigests(database(), at(2, '07:00:30'))));
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(1);
    const [mail, ...more] = (await delivered()).get(cast.people.artist.email)!;
    expect(more).toEqual([]);
    expect(mail.subject).toBe('3 things happened in 2 shows');
    for (const piece of [cast.show.title, other.show.title, 'Line of first.', 'Line of second.', 'Line of third.']) expect(mail.text).toContain(piece);
    // What comes after the hour waits for the next day's, as does what came to light late.
    await waiting(cast, 'artist', 'fourth', at(2, '08:00:00'));
    await waiting(cast, 'artist', 'late', at(2, '06:00:00'));
    expect(await sendDigests(database(), at(2, '20:00:00'))).toBe(0);
    expect(await sendDigests(database(), at(3, '07:00:00'))).toBe(1);
    expect((await delivered()).get(cast.people.artist.email)!.map((one) => one.subject)).toEqual(['3 things happened in 2 shows', `2 things happened in ${cast.show.title}`]);
  });

  test('of a day without anything is not sent, nor to whoever left or wants none', async () => {
    const cast = await createCrateShow();
    for (const who of ['artist', 'td', 'admin'] as const) {
      await choose(cast, who, 'daily');
      await waiting(cast, who, `for ${who}`, at(1, '12:00:00'));
    }
    await asOwner('delete from members where user_id = $1', [cast.people.artist.id]);
    await choose(cast, 'td', 'none');
    expect(await sendDigests(database(), at(2, '07:00:00'))).toBe(1);
    expect(await told(cast)).toEqual(['admin']);
    await choose(cast, 'td', 'daily');
    expect(await sendDigests(database(), at(3, '07:00:00'))).toBe(0);
  });

  test('tells one thing in its own words', async () => {
    const cast = await createCrateShow();
    const lock = await lockBody(cast, await approveBody(cast));
    await choose(cast, 'artist', 'daily');
    await ask(cast, 'artist');
    await unlock(cast, lock);
    expect(await sendDigests(database(), new Date(Date.now() + 24 * 3600 * 1000))).toBe(1);
    const [mail] = (await delivered()).get(cast.people.artist.email)!;
    expect(mail.subject).toBe(`crate/body unlocked in fer_0010 (${cast.show.title})`);
  });
});
