import { and, desc, eq, gt, lt, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { signInAttempts } from '@/db/schema/sign-in-attempts';
import { users } from '@/db/schema/users';
import { passwordFits } from './password';

const FAILURES_ALLOWED = 8;
const WINDOW_MS = 15 * 60 * 1000;

export type SignInOutcome =
  | { state: 'fits'; user: { id: string; name: string; email: string; sessionEpoch: number } }
  | { state: 'refused' }
  | { state: 'too_many'; until: Date };

/**
 * Whether e-mail and password belong to a user who may sign in. `refused` covers unknown, disabled, not yet accepted and
 * wrong alike; `too_many` answers more than eight failures for the address within fifteen minutes and says until when.
 * The attempt is written down before the password is looked at, so that attempts sent at once count one another.
 */
export async function verifyCredentials(db: Database, email: string, password: string): Promise<SignInOutcome> {
  const address = email.trim().toLowerCase();
  if (!address || address.length > 254 || !password || password.length > 1024) return { state: 'refused' };
  const [attempt] = await db.insert(signInAttempts).values({ email: address, succeeded: false }).returning();
  const until = await blockedUntil(db, address, attempt.id);
  if (until) {
    await db.delete(signInAttempts).where(eq(signInAttempts.id, attempt.id));
    return { state: 'too_many', until };
  }
  const [user] = await db.select().from(users).where(sql`lower(${users.email}) = ${address}`);
  const usable = user && !user.disabledAt ? user : null;
  const fits = await passwordFits(usable?.passwordHash ?? null, password);
  await db.delete(signInAttempts).where(lt(signInAttempts.at, sql`now() - interval '1 day'`));
  if (!usable || !fits) return { state: 'refused' };
  await db.update(signInAttempts).set({ succeeded: true }).where(eq(signInAttempts.id, attempt.id));
  return { state: 'fits', user: { id: usable.id, name: usable.name, email: usable.email, sessionEpoch: usable.sessionEpoch } };
}

/** When the eighth last failure before this attempt leaves the window; null while there are fewer. */
async function blockedUntil(db: Database, address: string, attemptId: number): Promise<Date | null> {
  const [eighth] = await db
    .select({ at: signInAttempts.at })
    .from(signInAttempts)
    .where(
      and(
        eq(signInAttempts.email, address),
        eq(signInAttempts.succeeded, false),
        lt(signInAttempts.id, attemptId),
        gt(signInAttempts.at, sql`now() - interval '15 minutes'`),
      ),
    )
    .orderBy(desc(signInAttempts.at))
    .offset(FAILURES_ALLOWED - 1)
    .limit(1);
  return eighth ? new Date(eighth.at.getTime() + WINDOW_MS) : null;
}
