import type { Metadata } from 'next';
import { ApprovalsQueue } from '@/components/approvals/approvals-queue';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showFrame } from '@/lib/shows/show-frame';
import { approvalActions } from './approval-actions';

export const metadata: Metadata = { title: 'Approvals' };

export default async function ApprovalsPage({ params }: { params: Promise<{ show: string }> }) {
  const { access } = await getPageShow((await params).show, 'readShow');
  return <ApprovalsQueue frame={showFrame(access)} actions={approvalActions} />;
}
