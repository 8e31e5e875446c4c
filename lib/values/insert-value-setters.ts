import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { SYSTEM_USER_ID } from '@/lib/auth/system-context';

/** Notes who changed a hashed input of these parts' values: such a person does not approve them. */
export async function insertValueSetters(
  tx: Transaction,
  partIds: readonly string[],
  by: { userId: string; act: 'setting' | 'version' | 'scale' | 'material' | 'rule' | 'rename'; shotId?: string },
): Promise<void> {
  if (partIds.length === 0 || by.userId === SYSTEM_USER_ID) return;
  await tx.execute(sql`
    insert into value_setters (part_id, shot_id, user_id, act)
    select unnest(${sql.param(partIds)}::uuid[]), ${by.shotId ?? null}::uuid, ${by.userId}::uuid, ${by.act}`);
}
