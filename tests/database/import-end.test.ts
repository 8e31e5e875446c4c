import { afterAll, beforeEach, describe, expect, test } from 'vitest';
import type { ActorContext } from '@/lib/context';
import { asOwner } from '../support/database';
import { readMail } from '../support/mail-text';
import { startSmtp } from '../support/smtp';

// The mail server has to be set before lib/config is read.
const smtp = await startSmtp();
process.env.SMTP_URL = smtp.url;
const { database } = await import('@/db/client');
const { cancelImport } = await import('@/lib/imports/cancel-import');
const { openImport } = await import('@/lib/imports/open-import');
const { putImportFile } = await import('@/lib/imports/put-import-file');
const { submitImport } = await import('@/lib/imports/submit-import');
const { drainQueue } = await import('@/lib/jobs/drain-queue');
const { tellImportHandler } = await import('@/lib/jobs/handlers/tell-import');
const { sendWaitingMails } = await import('@/lib/mail/send-waiting-mails');
const { sendDigests } = await import('@/lib/notices/send-digests');
const { openImportInput } = await import('@/lib/rules/inputs/open-import');
const { putImportFileInput } = await import('@/lib/rules/inputs/put-import-file');
const { parseInput } = await import('@/lib/rules/parse-input');
const { brokenObj, cubeObj } = await import('../support/cages');
const { createCast } = await import('../support/cast');
const { ownThread } = await import('../support/imports');
type Cast = Awaited<ReturnType<typeof createCast>>;

afterAll(() => smtp.close());
beforeEach(() => {
  smtp.taken.length = 0;
});

async function delivered() {
  await Promise.all([sendWaitingMails(database()), sendWaitingMails(database())]);
  return smtp.taken.splice(0).map((mail) => ({ to: mail.to[0], ...readMail(mail) }));
}

const byHand = (cast: Cast) => ({ ...cast.contextOf('td'), origin: 'hand' as const });

/** Opens, fills and submits an import as from the page; measured when it is told to be. */
async function submitted(cast: Cast, files: Record<string, string>, context: ActorContext = byHand(cast)): Promise<string> {
  const show = cast.show.code;
  const { id } = await openImport(context, parseInput(openImportInput, { show, scheme: 'polyhedral' }));
  for (const [name, text] of Object.entries(files)) await putImportFile(context, parseInput(putImportFileInput, { show, import: id, name }), new Request('http://127.0.0.1:3000/', { method: 'PUT', body: text }));
  await submitImport(context, { show, import: id });
  return id;
}

/** As if it had been submitted so long ago. */
const began = (id: string, secondsAgo: number) => asOwner('update imports set submitted_at = now() - make_interval(secs => $2) where id = $1', [id, secondsAgo]);
const watched = (id: string, secondsAgo: number) => asOwner('update imports set watched_at = now() - make_interval(secs => $2) where id = $1', [id, secondsAgo]);
const FILES = { 'ox_v001.obj': cubeObj(), 'set/broken_v001.obj': brokenObj };

describe('the end of an import', () => {
  test('that took long is written once, with counts, the failures with their place, and what mends them', async () => {
    const cast = await createCast();
    const id = await submitted(cast, FILES);
    await began(id, 400);
    await watched(id, 1);
    await drainQueue(database(), ownThread);
    await Promise.all([1, 2, 3].map(() => tellImportHandler(database(), { importId: id, since: null })));
    const [mail, ...more] = await delivered();
    expect(more).toEqual([]);
    expect(mail.to).toBe(cast.people.td.email);
    expect(mail.subject).toBe(`Import done: 1 measured, 1 failed (${cast.show.title})`);
    expect(mail.text).toContain('Your import of 2 files');
    expect(mail.text).toMatch(/- set\/broken_v001\.obj, line 10, column 11: \S.* Mend the named place in the file/);
    expect(mail.text).toContain(`/shows/${cast.show.code}/imports/${id}`);
    expect(mail.text).not.toContain('ox_v001');
  });

  test('that was left is written, and not to somebody who watched it', async () => {
    const cast = await createCast();
    const [left, seen] = [await submitted(cast, FILES), await submitted(cast, FILES)];
    for (const id of [left, seen]) await began(id, 120);
    await watched(left, 90);
    await watched(seen, 2);
    await drainQueue(database(), ownThread);
    const mails = await delivered();
    expect(mails).toHaveLength(1);
    expect(mails[0].text).toContain(`/imports/${left}`);
    expect(mails[0].text).toContain('because you left your import before its end');
  });

  test('that came at once, or that a script waits for, is not written', async () => {
    const cast = await createCast();
    await submitted(cast, FILES);
    await began(await submitted(cast, FILES, cast.contextOf('td')), 120);
    await drainQueue(database(), ownThread);
    expect(await delivered()).toEqual([]);
  });

  test('is written as its reader chose: with the daily digest, or not at all', async () => {
    const cast = await createCast();
    await asOwner(`update users set mail_choice = 'daily' where id = $1`, [cast.people.td.id]);
    await began(await submitted(cast, FILES), 400);
    await drainQueue(database(), ownThread);
    expect(await delivered()).toEqual([]);
    await sendDigests(database(), new Date(Date.now() + 2 * 86_400_000));
    expect((await delivered()).map((mail) => mail.text)).toEqual([expect.stringContaining('Your import of 2 files')]);
    await asOwner(`update users set mail_choice = 'none' where id = $1`, [cast.people.td.id]);
    await began(await submitted(cast, FILES), 400);
    await drainQueue(database(), ownThread);
    expect(await delivered()).toEqual([]);
  });

  test('by somebody else’s cancelling is written, by one’s own not', async () => {
    const cast = await createCast();
    const [mine, theirs] = [await submitted(cast, FILES), await submitted(cast, FILES)];
    await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: mine });
    await cancelImport(cast.contextOf('lead'), { show: cast.show.code, import: theirs });
    await drainQueue(database(), ownThread);
    const mails = await delivered();
    expect(mails).toHaveLength(1);
    expect(mails[0].subject).toContain('Import cancelled');
    expect(mails[0].text).toContain(`/imports/${theirs}`);
  });

  test('is not written to somebody who is out of the show by then', async () => {
    const cast = await createCast();
    await began(await submitted(cast, FILES), 400);
    await asOwner('delete from members where user_id = $1 and show_id = $2', [cast.people.td.id, cast.show.id]);
    await drainQueue(database(), ownThread);
    expect(await delivered()).toEqual([]);
  });
});
