import Link from 'next/link';
import { PageHeading } from '@/components/shell/page-heading';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { ROLE_NAMES, type ActingRole } from '@/lib/rules/roles';
import type { ValueState } from '@/lib/rules/states';
import { ShowRow } from './show-row';

export interface ShowSummary {
  code: string;
  title: string;
  archived: boolean;
  role: ActingRole;
  parts: Record<ValueState, number> | null;
}

/** Shows with what waits for somebody in each; archived ones below. */
export function ShowList({ shows, mayCreate }: { shows: readonly ShowSummary[]; mayCreate: boolean }) {
  const live = shows.filter((show) => !show.archived);
  const archived = shows.filter((show) => show.archived);
  const create = (
    <Button asChild look={shows.length === 0 ? 'filled' : 'outline'}>
      <Link href="/shows/new">New show</Link>
    </Button>
  );
  if (shows.length === 0) {
    return (
      <>
        <PageHeading title="Shows" />
        <EmptyState
          title={mayCreate ? 'No show yet' : 'You are in no show yet'}
          action={mayCreate ? create : undefined}
        >
          {mayCreate
            ? 'Make one: its unit and up axis hold for every cage that is imported.'
            : 'Ask a lead of your show to add you.'}
        </EmptyState>
      </>
    );
  }
  return (
    <>
      <PageHeading title="Shows" actions={mayCreate ? create : undefined} />
      <ul className="flex flex-col">
        {live.map((show) => (
          <ShowRow key={show.code} show={show} roleName={ROLE_NAMES[show.role]} />
        ))}
      </ul>
      {archived.length === 0 ? null : (
        <section aria-labelledby="archived-shows" className="mt-8">
          <h2 id="archived-shows" className="px-4 pb-2 text-ink-2 md:px-6">
            Archived
          </h2>
          <ul className="flex flex-col border-t border-rule">
            {archived.map((show) => (
              <ShowRow key={show.code} show={show} roleName={ROLE_NAMES[show.role]} />
            ))}
          </ul>
        </section>
      )}
    </>
  );
}
