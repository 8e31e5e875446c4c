import type { Executor } from '@/db/client';
import { valueFacts } from '@/lib/notices/value-facts';

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;
const HASH = /^[0-9a-f]{64}$/;

interface Change {
  field: string;
  before: string | null;
  after: string | null;
}

/** Fields whose text is the id of an approved value. */
function holdsValueId(field: string): boolean {
  return field === 'approval' || field === 'override_approval' || field.startsWith('lock ');
}

/** What the ids in these changes stand for, such as `585.1 kg (v012)`; a text that needs no other words is absent. */
export async function valueWords(db: Executor, changes: readonly Change[]): Promise<Map<string, string>> {
  const ids = new Set<string>();
  const words = new Map<string, string>();
  for (const { field, before, after } of changes) {
    for (const text of [before, after]) {
      if (text !== null && holdsValueId(field) && UUID.test(text)) ids.add(text);
      if (text !== null && field === 'asked' && HASH.test(text)) words.set(text, `value ${text.slice(0, 8)}`);
    }
  }
  for (const [id, fact] of await valueFacts(db, [...ids])) words.set(id, fact);
  return words;
}
