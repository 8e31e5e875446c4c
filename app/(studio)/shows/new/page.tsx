import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { PageHeading } from '@/components/shell/page-heading';
import { CreateShowForm } from '@/components/shows/create-show-form';
import { getPageContext } from '@/lib/auth/get-page-context';
import { createShowAction } from './actions';

export const metadata: Metadata = { title: 'New show' };

export default async function NewShowPage() {
  const { actor } = await getPageContext();
  if (!actor.isAdmin) notFound();
  return (
    <>
      <PageHeading title="New show" />
      <CreateShowForm send={createShowAction} />
    </>
  );
}
