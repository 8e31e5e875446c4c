import { eq, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { users } from '@/db/schema/users';
import { hashPassword } from '@/lib/auth/password';
import type { ActorContext } from '@/lib/context';
import type { Role } from '@/lib/rules/roles';

/** One password for all of the demo's people; printed at the start, so it is no secret. */
export const DEMO_PASSWORD = 'ferrow-tarn-demo';

export interface CrewMember {
  name: string;
  email: string;
  /** Null: admin of the whole studio. */
  role: Role | null;
  trade: string;
}

export const CREW = {
  odrun: { name: 'Odrun Vask', email: 'odrun.vask@oxbarrow.example', role: null, trade: 'admin' },
  tamsel: { name: 'Tamsel Wroe', email: 'tamsel.wroe@oxbarrow.example', role: 'lead', trade: 'lead' },
  ilvo: { name: 'Ilvo Brackmere', email: 'ilvo.brackmere@oxbarrow.example', role: 'td', trade: 'character TD' },
  hesta: { name: 'Hesta Quoin', email: 'hesta.quoin@oxbarrow.example', role: 'artist', trade: 'simulation artist' },
  pell: { name: 'Pell Garrowby', email: 'pell.garrowby@oxbarrow.example', role: 'guest', trade: 'guest, a vendor' },
} as const satisfies Record<string, CrewMember>;

/** Makes the people that are not there yet, with the demo's password and no mail; those who are there stay as they are. */
export async function seedCrew(db: Database): Promise<void> {
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  const crew = Object.values(CREW).map(({ name, email, role }) => ({ name, email, passwordHash, isAdmin: role === null }));
  await db.insert(users).values(crew).onConflictDoNothing();
}

/** A context in which one of the crew acts, as if signed in. */
export async function contextOf(db: Database, { email }: CrewMember): Promise<ActorContext> {
  const [user] = await db.select().from(users).where(eq(sql`lower(${users.email})`, email));
  if (!user) throw new Error(`${email} is not in the database.`);
  return { db, actor: { userId: user.id, email: user.email, name: user.name, isAdmin: user.isAdmin, via: 'system', tokenId: null }, origin: 'hand', requestId: 'seed' };
}
