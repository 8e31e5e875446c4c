import type { Metadata } from 'next';
import { PageHeading } from '@/components/shell/page-heading';
import { CreateShowForm } from '@/components/shows/create-show-form';
import { getAdminPageContext } from '@/lib/auth/get-page-context';
import { createShowAction } from './actions';

export const metadata: Metadata = { title: 'New show' };

export default async function NewShowPage() {
  await getAdminPageContext();
  return (
    <>
      <PageHeading title="New show" />
      <CreateShowForm send={createShowAction} />
    </>
  );
}
