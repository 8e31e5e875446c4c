import type { ShotActs } from '@/lib/rules/shot-detail';
import { may } from '@/lib/rules/roles';
import type { ShowAccess } from '@/lib/shows/get-show-access';

/** What somebody with this access may do with shots. */
export function shotActs({ show, role }: Pick<ShowAccess, 'show' | 'role'>): ShotActs {
  const writable = show.archivedAt === null;
  return { may_edit: writable && may(role, 'editShots'), may_lock: writable && may(role, 'lockValues'), may_draft: writable && may(role, 'draftOverride') };
}
