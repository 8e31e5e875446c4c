import type { Metadata } from 'next';
import { GivenUpFiles } from '@/components/admin/given-up-files';
import { QueueFacts } from '@/components/admin/queue-facts';
import { RefreshNowAndThen } from '@/components/admin/refresh-now-and-then';
import { PageHeading } from '@/components/shell/page-heading';
import { getAdminPageContext } from '@/lib/auth/get-page-context';
import { getQueue } from '@/lib/jobs/get-queue';
import { retryFilesAction } from './actions';

export const metadata: Metadata = { title: 'Queue' };

export default async function QueuePage() {
  const state = await getQueue(await getAdminPageContext());
  return (
    <>
      <PageHeading title="Queue" />
      <RefreshNowAndThen />
      <div className="flex flex-col gap-10 px-4 py-6 md:px-6">
        <QueueFacts {...state} />
        <GivenUpFiles files={state.given_up} retry={retryFilesAction} />
      </div>
    </>
  );
}
