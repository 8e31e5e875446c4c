import type { ActorContext, Context } from '@/lib/context';
import { StudioError } from '@/lib/rules/studio-error';

/** The context with its actor; throws not_signed_in when nobody was recognised. */
export function requireActor(context: Context): ActorContext {
  if (!context.actor) throw new StudioError('not_signed_in', 'Sign in, or send a token that is still good.');
  return context as ActorContext;
}
