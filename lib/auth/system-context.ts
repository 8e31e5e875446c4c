import { randomUUID } from 'node:crypto';
import type { Database } from '@/db/client';
import type { ActorContext } from '@/lib/context';

/** Stands for nobody in particular; history keeps such an act without a person. */
export const SYSTEM_USER_ID = '00000000-0000-0000-0000-000000000000';

/** The context of the command line on the server's own machine, which may do everything. */
export function systemContext(db: Database): ActorContext {
  return {
    db,
    actor: { userId: SYSTEM_USER_ID, email: '', name: 'Command line', isAdmin: true, via: 'system', tokenId: null },
    origin: 'api',
    requestId: randomUUID(),
  };
}
