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
  approvals: [],
  locks: ['unlocked_at', 'unlocked_by', 'unlock_reason'],
};
