/**
 * Tables that are written once: the application's role may add rows and read them, never remove them, and change
 * nothing but the columns named here.
 */
export const appendOnlyTables: Readonly<Record<string, readonly string[]>> = {
  geometry_records: [],
  geometry_parts: [],
  geometry_components: [],
  findings: [],
  settings: [],
  audit_events: [],
  audit_items: [],
  receipts: [],
  receipt_rows: [],
  approvals: [],
  withdrawals: [],
  value_setters: [],
  part_renames: [],
  locks: ['unlocked_at', 'unlocked_by', 'unlock_reason'],
  lock_claims: ['released_at'],
  shot_overrides: ['dropped_at', 'dropped_by'],
};
