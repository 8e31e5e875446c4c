/** Roles a person holds in one show. An admin is not a role in a show: it is a property of the user and stands above all of them. */
export const ROLES = ['lead', 'td', 'artist', 'guest'] as const;
export type Role = (typeof ROLES)[number];

/** What somebody acts as in a show: their role there, or admin of the whole studio. */
export type ActingRole = Role | 'admin';

export const PERMISSIONS = {
  readShow: ['admin', 'lead', 'td', 'artist'],
  readLocked: ['admin', 'lead', 'td', 'artist', 'guest'],
  editShow: ['admin', 'lead'],
  editMembers: ['admin', 'lead'],
  importCages: ['admin', 'lead', 'td'],
  setValues: ['admin', 'lead', 'td'],
  renameParts: ['admin', 'lead', 'td'],
  askApproval: ['admin', 'lead', 'td'],
  approveValues: ['admin', 'lead'],
  editShots: ['admin', 'lead', 'td'],
  lockValues: ['admin', 'lead'],
  draftOverride: ['admin', 'lead', 'td', 'artist'],
  exportRows: ['admin', 'lead', 'td', 'artist'],
  readHistory: ['admin', 'lead', 'td', 'artist'],
  createShow: ['admin'],
  editUsers: ['admin'],
  readStudio: ['admin'],
} as const satisfies Record<string, readonly ActingRole[]>;

export type Permission = keyof typeof PERMISSIONS;

/** Whether the role may do this. The one place that decides. */
export function may(role: ActingRole, permission: Permission): boolean {
  return (PERMISSIONS[permission] as readonly ActingRole[]).includes(role);
}

export const ROLE_NAMES: Record<ActingRole, string> = {
  admin: 'Admin',
  lead: 'Lead',
  td: 'Character TD',
  artist: 'Simulation artist',
  guest: 'Guest',
};
