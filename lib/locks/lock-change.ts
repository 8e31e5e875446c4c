import type { ChangedField } from '@/lib/history/record-event';

/** What the history says of a lock that begins or ends: the field names its shot and copy, the values are approvals. */
export function lockChange(lock: { part_id: string; shot_id: string; shot: string; copy: string }, before: string | null, after: string | null): ChangedField {
  return { partId: lock.part_id, shotId: lock.shot_id, field: `lock ${lock.shot}${lock.copy ? ` ${lock.copy}` : ''}`, before, after };
}
