import { and, eq, lt, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { signInAttempts } from '@/db/schema/sign-in-attempts';
import { users } from '@/db/schema/users';
import { passwordFits } from './password';

const FAILURES_ALLOWED = 8;
const WINDOW = sql`now() - interval '15 minutes'`;

/**
 * The user whom e-mail and password fit; null otherwise (unknown, disabled, not yet accepted, wrong password, or more than
 * eight failures for this e-mail within fifteen minutes).
 */
export async function verifyCredentials(db: Database, email: string, password: string) {
  const address = email.trim().toLowerCase();
  if (!address || !password || password.length > 1024) return null;
  const failures = await db.$count(
    signInAttempts,
    and(eq(signInAttempts.email, address), eq(signInAttempts.succeeded, false), sql`${signInAttempts.at} > ${WINDOW}`),
  );
  if (failures >= FAILURES_ALLOWED) return null;
  const [user] = await db.select().from(users).where(sql`lower(${users.email}) = ${address}`);
  const usable = user && !user.disabledAt ? user : null;
  const fits = await passwordFits(usable?.passwordHash ?? null, password);
  await db.insert(signInAttempts).values({ email: address, succeeded: fits });
  await db.delete(signInAttempts).where(lt(signInAttempts.at, sql`now() - interval '1 day'`));
  if (!usable || !fits) return null;
  return { id: usable.id, name: usable.name, email: usable.email, sessionEpoch: usable.sessionEpoch };
}
