import type { Metadata } from 'next';
import Link from 'next/link';
import { ImportDesk } from '@/components/imports/import-desk';
import { PageHeading } from '@/components/shell/page-heading';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { getImportPreparation } from '@/lib/imports/get-import-preparation';
import { may } from '@/lib/rules/roles';
import { getPageShow } from '@/lib/shows/get-page-show';

export const metadata: Metadata = { title: 'Import' };

export default async function ImportPage({ params }: { params: Promise<{ show: string }> }) {
  const { context, access } = await getPageShow((await params).show, 'readShow');
  const { code, archivedAt } = access.show;
  const mayImport = may(access.role, 'importCages') && archivedAt === null;
  const list = (
    <Button asChild>
      <Link href={`/shows/${code}/imports`}>Imports so far</Link>
    </Button>
  );
  return (
    <>
      <PageHeading title="Import" actions={list} />
      {mayImport ? (
        <ImportDesk preparation={await getImportPreparation(context, { show: code })} />
      ) : (
        <EmptyState title={archivedAt ? `${code} is archived` : 'Importing is for TDs and leads'} action={list}>
          {archivedAt ? 'An archived show can only be read.' : 'Ask a lead of the show if you should bring in cages.'}
        </EmptyState>
      )}
    </>
  );
}
