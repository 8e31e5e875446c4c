import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ImportReport } from '@/components/imports/import-report';
import { config } from '@/lib/config';
import { getImport } from '@/lib/imports/get-import';
import { may } from '@/lib/rules/roles';
import { StudioError } from '@/lib/rules/studio-error';
import { getPageShow } from '@/lib/shows/get-page-show';

export const metadata: Metadata = { title: 'Import' };

export default async function ImportPage({ params }: { params: Promise<{ show: string; import: string }> }) {
  const { show, import: id } = await params;
  const { context, access } = await getPageShow(show, 'readShow');
  const { code, upAxis, archivedAt, namePattern } = access.show;
  const detail = await getImport(context, { show: code, import: id }).catch((error: unknown) => {
    if (error instanceof StudioError && error.code === 'not_found') notFound();
    throw error;
  });
  return (
    <ImportReport
      key={detail.id}
      show={code}
      upAxis={upAxis}
      initial={detail}
      address={`${config().baseUrl}/shows/${code}/imports/${detail.id}`}
      namePattern={namePattern}
      mayImport={may(access.role, 'importCages') && archivedAt === null}
    />
  );
}
