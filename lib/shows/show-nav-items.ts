import { may } from '@/lib/rules/roles';
import type { ShowAccess } from './get-show-access';

/** The pages of a show that its member may open, in the bar's order. */
export function showNavItems({ show, role }: Pick<ShowAccess, 'show' | 'role'>): { href: string; label: string; covers?: string }[] {
  const href = `/shows/${encodeURIComponent(show.code)}`;
  return [
    ...(may(role, 'readShow') ? [{ href, label: 'Parts' }] : []),
    ...(may(role, 'importCages') && !show.archivedAt ? [{ href: `${href}/import`, label: 'Import', covers: `${href}/imports` }] : []),
    ...(may(role, 'readShow') ? [{ href: `${href}/approvals`, label: 'Approvals', covers: `${href}/compare` }] : []),
    ...(may(role, 'readShow') ? [{ href: `${href}/shots`, label: 'Shots', covers: `${href}/sequences` }] : []),
    ...(may(role, 'exportRows') ? [{ href: `${href}/export`, label: 'Export' }] : []),
    ...(may(role, 'readHistory') ? [{ href: `${href}/history`, label: 'History' }] : []),
    ...(may(role, 'readShow') ? [{ href: `${href}/settings`, label: 'Settings' }] : []),
  ];
}
