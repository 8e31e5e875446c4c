import type { ValueState } from '@/lib/rules/states';
import type { ComputedValue } from './compute-value';

/** An approval that nobody took back. */
export interface StandingApproval {
  id: string;
  valueSha256: string;
}

/**
 * What a part's approvals (the newest first) make of its value: approved where one of them is for the very value, out of date
 * where all are for others. A value that is not there keeps its own state.
 */
export function approvalOf(value: Pick<ComputedValue, 'state' | 'valueSha256'>, approvals: readonly StandingApproval[]): { state: ValueState; value_id: string | null; last_approval_id: string | null } {
  const last = approvals.length > 0 ? approvals[0].id : null;
  const exact = value.state === 'measured' ? approvals.find((one) => one.valueSha256 === value.valueSha256) : undefined;
  if (exact) return { state: 'approved', value_id: exact.id, last_approval_id: last };
  return { state: value.state === 'measured' && last !== null ? 'outdated' : value.state, value_id: null, last_approval_id: last };
}
