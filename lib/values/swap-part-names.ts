import { eq } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { parts } from '@/db/schema/parts';

export interface NamedPart {
  id: string;
  name: string;
}

/**
 * Gives a part the name of another one of its asset, which from now on only stands for it under the name that it had. Names are unique at
 * every moment, so the first goes by its id in between.
 */
export async function swapPartNames(tx: Transaction, part: NamedPart, other: NamedPart): Promise<void> {
  await tx.update(parts).set({ name: part.id }).where(eq(parts.id, part.id));
  await tx.update(parts).set({ name: part.name, mergedInto: part.id }).where(eq(parts.id, other.id));
  await tx.update(parts).set({ name: other.name }).where(eq(parts.id, part.id));
}
