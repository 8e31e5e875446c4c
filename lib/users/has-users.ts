import type { Executor } from '@/db/client';
import { users } from '@/db/schema/users';

/** Whether the studio has anybody yet. */
export async function hasUsers(db: Executor): Promise<boolean> {
  return (await db.select({ id: users.id }).from(users).limit(1)).length > 0;
}
