import type { ActorContext, Context } from '@/lib/context';

/** A context whose actor is the user themself, for acts of somebody who is not signed in yet: links, and the first admin. */
export function contextOfUser(context: Context, user: { id: string; email: string; name: string; isAdmin: boolean }): ActorContext {
  return { ...context, actor: { userId: user.id, email: user.email, name: user.name, isAdmin: user.isAdmin, via: 'session', tokenId: null } };
}
