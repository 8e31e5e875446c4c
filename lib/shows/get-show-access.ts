import { and, eq, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { members } from '@/db/schema/members';
import { shows } from '@/db/schema/shows';
import type { Actor } from '@/lib/context';
import { may, type ActingRole, type Permission } from '@/lib/rules/roles';
import { StudioError } from '@/lib/rules/studio-error';

export type Show = typeof shows.$inferSelect;

export interface ShowAccess {
  show: Show;
  role: ActingRole;
  /** For a guest: the codes they are invited to. */
  shots: string[];
  assets: string[];
}

/**
 * The show, if the actor may do this in it. Outsiders get not_found, as do guests for what they may not see; other members
 * who lack the permission get forbidden; a write to an archived show is refused as frozen.
 */
export async function getShowAccess(db: Executor, actor: Actor, code: string, permission: Permission): Promise<ShowAccess> {
  const [found] = await db
    .select({ show: shows, member: members })
    .from(shows)
    .leftJoin(members, and(eq(members.showId, shows.id), eq(members.userId, actor.userId)))
    .where(sql`lower(${shows.code}) = lower(${code})`);
  const role: ActingRole | null = actor.isAdmin ? 'admin' : (found?.member?.role ?? null);
  if (!found || !role) throw new StudioError('not_found', `There is no show ${code}.`);
  if (!may(role, permission)) {
    if (role === 'guest') throw new StudioError('not_found', 'There is nothing here for you.');
    throw new StudioError('forbidden', `Your role in ${found.show.code} does not allow this. Ask a lead.`);
  }
  if (found.show.archivedAt && WRITES.has(permission)) {
    throw new StudioError('frozen', `${found.show.code} is archived and can only be read.`);
  }
  return { show: found.show, role, shots: found.member?.shots ?? [], assets: found.member?.assets ?? [] };
}

const WRITES: ReadonlySet<Permission> = new Set<Permission>(['editShow', 'editMembers', 'importCages', 'setValues', 'askApproval', 'approveValues', 'editShots', 'lockValues', 'draftOverride']);
