import type { Metadata } from 'next';
import Link from 'next/link';
import { ImportsList } from '@/components/imports/imports-list';
import { PageHeading } from '@/components/shell/page-heading';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { listImports } from '@/lib/imports/list-imports';
import { may } from '@/lib/rules/roles';
import { getPageShow } from '@/lib/shows/get-page-show';

export const metadata: Metadata = { title: 'Imports' };

type Props = { params: Promise<{ show: string }>; searchParams: Promise<{ cursor?: string | string[] }> };

export default async function ImportsPage({ params, searchParams }: Props) {
  const { context, access } = await getPageShow((await params).show, 'readShow');
  const { code, archivedAt } = access.show;
  const cursor = (await searchParams).cursor;
  const page = await listImports(context, { show: code, limit: 50, cursor: typeof cursor === 'string' ? cursor : undefined });
  const bring =
    may(access.role, 'importCages') && archivedAt === null ? (
      <Button asChild look="filled">
        <Link href={`/shows/${code}/import`}>Import cages</Link>
      </Button>
    ) : null;
  return (
    <>
      <PageHeading title="Imports" actions={bring} />
      {page.items.length === 0 ? (
        <EmptyState title="Nothing was imported yet" action={bring}>
          The first import fixes the show’s unit, up axis and scheme.
        </EmptyState>
      ) : (
        <ImportsList key={cursor?.toString()} show={code} items={page.items} mark={page.mark} />
      )}
      {page.next_cursor === null ? null : (
        <div className="px-4 py-4 md:px-6">
          <Button asChild>
            <Link href={`/shows/${code}/imports?cursor=${encodeURIComponent(page.next_cursor)}`}>Older ones</Link>
          </Button>
        </div>
      )}
    </>
  );
}
