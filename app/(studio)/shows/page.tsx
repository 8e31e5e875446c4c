import type { Metadata } from 'next';
import { ShowList } from '@/components/shows/show-list';
import { getPageContext } from '@/lib/auth/get-page-context';
import { listShows } from '@/lib/shows/list-shows';

export const metadata: Metadata = { title: 'Shows' };

export default async function ShowsPage() {
  const context = await getPageContext();
  const { items } = await listShows(context, { limit: 500 });
  return <ShowList shows={items} mayCreate={context.actor.isAdmin} />;
}
