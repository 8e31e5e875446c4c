import type { Metadata } from 'next';
import { approvalActions } from '@/app/shows/[show]/approvals/approval-actions';
import { PartsTable } from '@/components/parts/parts-table';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showFrame } from '@/lib/shows/show-frame';

export const metadata: Metadata = { title: 'Parts' };

export default async function PartsPage({ params }: { params: Promise<{ show: string }> }) {
  const { access } = await getPageShow((await params).show, 'readShow');
  return <PartsTable frame={showFrame(access)} actions={approvalActions} />;
}
