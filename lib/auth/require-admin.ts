import type { ActorContext, Context } from '@/lib/context';
import { may, type Permission } from '@/lib/rules/roles';
import { StudioError } from '@/lib/rules/studio-error';
import { requireActor } from './require-actor';

/** The context of somebody who may do this in the whole studio; others are told so. */
export function requireAdmin(context: Context, permission: Permission): ActorContext {
  const known = requireActor(context);
  if (!known.actor.isAdmin || !may('admin', permission)) throw new StudioError('forbidden', 'Only an admin of the studio may do this.');
  return known;
}
