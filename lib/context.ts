import type { Database } from '@/db/client';
import type { Origin } from '@/lib/rules/states';

/** Somebody who was recognised: by the signed-in session or by a token. */
export interface Actor {
  userId: string;
  email: string;
  name: string;
  isAdmin: boolean;
  via: 'session' | 'token' | 'system';
  tokenId: string | null;
}

/** What every verb gets: the database, who asks (null: nobody signed in), where the change comes from, and the request's reference. */
export interface Context {
  db: Database;
  actor: Actor | null;
  origin: Origin;
  requestId: string;
}

/** A context whose actor is known. */
export interface ActorContext extends Context {
  actor: Actor;
}
