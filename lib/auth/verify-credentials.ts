import { and, desc, eq, gt, lt, sql } from 'drizzle-orm';
import type { Database, Transaction } from '@/db/client';
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
 * The attempt is written down before the password is looked at, one at a time for an address, so that attempts sent at
 * once count one another.
 */
export async function verifyCredentials(db: Database, email: string, password: string): Promise<SignInOutcome> {
  const address = email.trim().toLowerCase();
  if (!address || address.length > 254 || !password || password.length > 1024) return { state: 'refused' };
  const attempt = await writeAttempt(db, address);
  if (attempt.until) return { state: 'too_many', until: attempt.until };
  const [user] = await db.select().from(users).where(sql`lower(${users.email}) = ${address}`);
  const usable = user && !user.disabledAt ? user : null;
  const fits = await passwordFits(usable?.passwordHash ?? null, password);
  await db.delete(signInAttempts).where(lt(signInAttempts.at, sql`now() - interval '1 day'`));
  if (!usable || !fits) return { state: 'refused' };
  await db.update(signInAttempts).set({ succeeded: true }).where(eq(signInAttempts.id, attempt.id));
  return { state: 'fits', user: { id: usable.id, name: usable.name, email: usable.email, sessionEpoch: usable.sessionEpoch } };
}

/** Writes an attempt down as failed, for now; where too many failed before it, it is left out and answered is until when. */
async function writeAttempt(db: Database, address: string): Promise<{ id: number; until: null } | { id: null; until: Date }> {
  return db.transaction(async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${address}, 0))`);
    const until = await blockedUntil(tx, address);
    if (until) return { id: null, until };
    const [attempt] = await tx.insert(signInAttempts).values({ email: address, succeeded: false }).returning({ id: signInAttempts.id });
    return { id: attempt.id, until: null };
  });
}

/** When the eighth last failure leaves the window; null while there are fewer. */
async function blockedUntil(tx: Transaction, address: string): Promise<Date | null> {
  const [eighth] = await tx
    .select({ at: signInAttempts.at })
    .from(signInAttempts)
    .where(
      and(
        eq(signInAttempts.email, address),
        eq(signInAttempts.succeeded, false),
        gt(signInAttempts.at, sql`now() - interval '15 minutes'`),
      ),
    )
    .orderBy(desc(signInAttempts.at))
    .offset(FAILURES_ALLOWED - 1)
    .limit(1);
  return eighth ? new Date(eighth.at.getTime() + WINDOW_MS) : null;
}
