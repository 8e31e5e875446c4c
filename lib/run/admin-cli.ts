import { desc, eq, sql } from 'drizzle-orm';
import { closeDatabase, database } from '@/db/client';
import { mails } from '@/db/schema/mails';
import { systemContext } from '@/lib/auth/system-context';
import type { ActorContext } from '@/lib/context';
import { addTokenInput } from '@/lib/rules/inputs/add-token';
import { addUserInput } from '@/lib/rules/inputs/add-user';
import { disableUserInput } from '@/lib/rules/inputs/disable-user';
import { revokeTokenInput } from '@/lib/rules/inputs/revoke-token';
import { setMemberInput } from '@/lib/rules/inputs/set-member';
import { parseInput } from '@/lib/rules/parse-input';
import { StudioError } from '@/lib/rules/studio-error';
import { checkStorage } from '@/lib/storage/check-storage';
import { setMember } from '@/lib/shows/set-member';
import { addToken } from '@/lib/tokens/add-token';
import { revokeToken } from '@/lib/tokens/revoke-token';
import { addUser } from '@/lib/users/add-user';
import { disableUser } from '@/lib/users/disable-user';
import type { Order } from './admin-arguments';
import { isStillWrong, storageWords } from './storage-words';

/** The invitation link of the message that was just written to this person. */
async function invitationLink(context: ActorContext, email: string): Promise<string | null> {
  const [mail] = await context.db.select({ text: mails.text }).from(mails).where(eq(sql`lower(${mails.toEmail})`, email.toLowerCase())).orderBy(desc(mails.createdAt)).limit(1);
  return mail?.text.match(/https?:\/\/\S+\/invite\/[\w-]+/)?.[0] ?? null;
}

/** Runs the verb and answers what to print, with the exit code where that is not 0. */
async function perform(context: ActorContext, order: Order): Promise<string | { text: string; code: number }> {
  switch (order.verb) {
    case 'user add': {
      const user = await addUser(context, parseInput(addUserInput, order.input));
      const link = await invitationLink(context, user.email);
      return [`Added ${user.email}${user.admin ? ', an admin' : ''}.`, ...(link ? [link] : [])].join('\n');
    }
    case 'user disable':
      return `Disabled ${(await disableUser(context, parseInput(disableUserInput, order.input))).email}.`;
    case 'token add':
      return (await addToken(context, parseInput(addTokenInput, order.input))).token;
    case 'token revoke':
      return `Revoked ${(await revokeToken(context, parseInput(revokeTokenInput, order.input))).id}.`;
    case 'member set': {
      const member = await setMember(context, parseInput(setMemberInput, order.input));
      return `${member.email} is ${member.role} in ${order.input.show}.`;
    }
    case 'storage check': {
      const found = await checkStorage(context.db, order.input);
      return { text: storageWords(found, order.input.deep), code: found.faults.some(isStillWrong) ? 1 : 0 };
    }
  }
}

/** Does what the command line said, as the machine's own operator. Resolves to the exit code: 0 done, 1 refused or found wrong. */
export async function runOrder(order: Order): Promise<number> {
  try {
    const done = await perform(systemContext(database()), order);
    console.log(typeof done === 'string' ? done : done.text);
    return typeof done === 'string' ? 0 : done.code;
  } catch (error) {
    if (!(error instanceof StudioError)) throw error;
    console.error(error.message);
    return 1;
  } finally {
    await closeDatabase();
  }
}
