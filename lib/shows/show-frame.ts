import { may } from '@/lib/rules/roles';
import type { ShowFrame } from '@/lib/rules/show-frame';
import type { ShowAccess } from './get-show-access';

/** What a screen needs to know of the show, for somebody with this access. */
export function showFrame({ show, role }: Pick<ShowAccess, 'show' | 'role'>): ShowFrame {
  const writable = show.archivedAt === null;
  return {
    code: show.code,
    title: show.title,
    linear_unit: show.linearUnit,
    up_axis: show.upAxis,
    may_set: writable && may(role, 'setValues'),
    may_ask: writable && may(role, 'askApproval'),
    may_approve: writable && may(role, 'approveValues'),
    may_import: writable && may(role, 'importCages'),
  };
}
