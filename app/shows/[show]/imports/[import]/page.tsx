import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ImportReport } from '@/components/imports/import-report';
import { config } from '@/lib/config';
import { getImportSummary } from '@/lib/imports/get-import-summary';
import { listImportFileRows } from '@/lib/imports/list-import-file-rows';
import { listImportFilesInput } from '@/lib/rules/inputs/list-import-files';
import { may } from '@/lib/rules/roles';
import { StudioError } from '@/lib/rules/studio-error';
import { getPageShow } from '@/lib/shows/get-page-show';

export const metadata: Metadata = { title: 'Import' };

type Props = { params: Promise<{ show: string; import: string }>; searchParams: Promise<{ only?: string; q?: string; sort?: string }> };

export default async function ImportPage({ params, searchParams }: Props) {
  const { show, import: id } = await params;
  const { only, q, sort } = await searchParams;
  const { context, access } = await getPageShow(show, 'readShow');
  const { code, upAxis, archivedAt } = access.show;
  const ref = { show: code, import: id };
  // An address that was changed by hand shows all files.
  const asked = listImportFilesInput.safeParse({ ...ref, only, q, sort });
  const input = asked.success ? asked.data : listImportFilesInput.parse(ref);
  const summary = await getImportSummary(context, ref).catch((error: unknown) => {
    if (error instanceof StudioError && error.code === 'not_found') notFound();
    throw error;
  });
  const page = await listImportFileRows(context, input);
  return (
    <ImportReport
      key={summary.id}
      show={code}
      upAxis={upAxis}
      initial={summary}
      first={{ query: { only: input.only, q: input.q, sort: input.sort }, page }}
      address={`${config().baseUrl}/shows/${code}/imports/${summary.id}`}
      mayImport={may(access.role, 'importCages') && archivedAt === null}
    />
  );
}
