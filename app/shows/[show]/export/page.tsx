import type { Metadata } from 'next';
import Link from 'next/link';
import { Caution } from '@/components/exports/caution';
import { ExportFilters } from '@/components/exports/export-filters';
import { ExportPreviewTable } from '@/components/exports/export-preview-table';
import { PageHeading } from '@/components/shell/page-heading';
import { Button } from '@/components/ui/button';
import { selectionText } from '@/lib/exports/export-selection';
import { previewExport } from '@/lib/exports/preview-export';
import { exportRowsInput } from '@/lib/rules/inputs/export-rows';
import { getPageShow } from '@/lib/shows/get-page-show';

export const metadata: Metadata = { title: 'Export' };

type Props = { params: Promise<{ show: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> };

export default async function ExportPage({ params, searchParams }: Props) {
  const { context, access } = await getPageShow((await params).show, 'exportRows');
  const { asset, state, category } = await searchParams;
  const show = access.show.code;
  // An address that somebody mistyped shows everything rather than an error.
  const asked = exportRowsInput.safeParse({ show, asset: asset || undefined, state: state || undefined, category: category || undefined });
  const selection = asked.success ? asked.data : exportRowsInput.parse({ show });
  const preview = await previewExport(context, selection);
  const address = `/api/v1/shows/${encodeURIComponent(show)}/export`;
  const query = selectionText(selection);
  const actions = (
    <>
      <Button asChild look="quiet">
        <Link href={`/shows/${encodeURIComponent(show)}/receipts`}>Receipts</Link>
      </Button>
      <Button asChild>
        <a href={`${address}.json${query && `?${query}`}`} download>
          JSON
        </a>
      </Button>
      <Button asChild look="filled">
        <a href={`${address}.csv?${selectionText({ ...selection, guard: '1' })}`} download>
          Download CSV
        </a>
      </Button>
    </>
  );
  return (
    <>
      <PageHeading title="Export" actions={actions} />
      <ExportFilters />
      <ExportPreviewTable preview={preview} />
      <Caution />
    </>
  );
}
