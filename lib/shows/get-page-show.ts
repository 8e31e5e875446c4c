import { notFound } from 'next/navigation';
import { cache } from 'react';
import { getPageContext } from '@/lib/auth/get-page-context';
import type { ActorContext } from '@/lib/context';
import type { Permission } from '@/lib/rules/roles';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess, type ShowAccess } from './get-show-access';

/**
 * The show of a page and who looks at it: an outsider, and whoever may not see this page, gets the page for addresses
 * where nothing is. Ask with a permission to read; a page that also writes decides by `access.role` what it offers.
 */
export const getPageShow = cache(async (code: string, permission: Permission): Promise<{ context: ActorContext; access: ShowAccess }> => {
  const context = await getPageContext();
  try {
    return { context, access: await getShowAccess(context.db, context.actor, decodeURIComponent(code), permission) };
  } catch (error) {
    if (error instanceof StudioError && (error.code === 'not_found' || error.code === 'forbidden')) notFound();
    throw error;
  }
});
