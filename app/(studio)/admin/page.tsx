import type { Metadata } from 'next';
import { PageHeading } from '@/components/shell/page-heading';
import { StudioFacts } from '@/components/users/studio-facts';
import { getAdminPageContext } from '@/lib/auth/get-page-context';
import { getStudioState } from '@/lib/studio/get-studio-state';

export const metadata: Metadata = { title: 'Studio' };

export default async function StudioPage() {
  const state = await getStudioState(await getAdminPageContext());
  return (
    <>
      <PageHeading title="Studio" />
      <StudioFacts {...state} />
    </>
  );
}
