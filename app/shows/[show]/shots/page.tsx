import type { Metadata } from 'next';
import Link from 'next/link';
import { OutdatedLocks } from '@/components/locks/outdated-locks';
import { PageHeading } from '@/components/shell/page-heading';
import { AddShots } from '@/components/shots/add-shots';
import { ShotFilters } from '@/components/shots/shot-filters';
import { shotsHref } from '@/components/shots/shot-hrefs';
import { ShotTable } from '@/components/shots/shot-table';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import type { ActorContext } from '@/lib/context';
import { listOutdated } from '@/lib/locks/list-outdated';
import { listShotsInput, type ListShotsInput } from '@/lib/rules/inputs/list-shots';
import { counted } from '@/lib/rules/shot-words';
import { countShots } from '@/lib/shots/count-shots';
import { listAssetCodes } from '@/lib/shots/list-asset-codes';
import { listShots } from '@/lib/shots/list-shots';
import { shotActs } from '@/lib/shots/shot-acts';
import type { ShowAccess } from '@/lib/shows/get-show-access';
import { getPageShow } from '@/lib/shows/get-page-show';
import { planShotsAction, putShotsAction, relockValuesAction } from './actions';

export const metadata: Metadata = { title: 'Shots' };

type Props = { params: Promise<{ show: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> };

const PAGE_SHOTS = 300;

export default async function ShotsPage({ params, searchParams }: Props) {
  const { context, access } = await getPageShow((await params).show, 'readShow');
  const show = access.show.code;
  const { q, asset, state, cursor } = await searchParams;
  // An address that somebody mistyped shows everything rather than an error.
  const asked = listShotsInput.safeParse({ show, q: q || undefined, asset: asset || undefined, state: state || undefined, cursor: cursor || undefined, limit: PAGE_SHOTS });
  const input: ListShotsInput = asked.success ? asked.data : listShotsInput.parse({ show, limit: PAGE_SHOTS });
  const counts = await countShots(context, { show, asset: input.asset, q: input.q });
  const assets = await listAssetCodes(context, { show });
  const acts = shotActs(access);
  const any = counts.shots > 0 || input.asset !== undefined || Boolean(input.q);
  const add = (primary: boolean) => (acts.may_edit ? <AddShots show={show} assets={assets} primary={primary} plan={planShotsAction} put={putShotsAction} /> : null);
  if (!any) {
    return (
      <>
        <PageHeading title="Shots" />
        <EmptyState title="No shots yet" action={add(true)}>
          {acts.may_edit
            ? 'Paste them from the shot list, drop a CSV file, or add one by hand: sequence, shot, the assets in it. Then lock what is approved.'
            : 'A lead or a character TD adds the shots and the assets in them.'}
        </EmptyState>
      </>
    );
  }
  return (
    <>
      <PageHeading
        title="Shots"
        measure={<p className="text-14 text-ink-2">{`${counted(counts.shots, 'shot')} in ${counted(counts.sequences, 'sequence')}`}</p>}
        actions={add(input.state !== 'outdated')}
      />
      <ShotFilters counts={counts} assets={assets} />
      {input.state === 'outdated' ? await outdatedLocks(context, access, input) : await listedShots(context, input)}
    </>
  );
}

async function outdatedLocks(context: ActorContext, access: ShowAccess, { show, asset, q }: ListShotsInput) {
  const words = (q ?? '').toLowerCase().split(/\s+/).filter(Boolean);
  const { items } = await listOutdated(context, { show });
  const locks = items.filter((lock) => (asset === undefined || lock.asset === asset) && words.every((word) => `${lock.sequence} ${lock.shot}`.toLowerCase().includes(word)));
  if (locks.length === 0) return <EmptyState title="Nothing is out of date">What is locked is what the parts weigh now.</EmptyState>;
  return <OutdatedLocks show={show} unit={access.show.linearUnit} locks={locks} mayLock={shotActs(access).may_lock} primary relock={relockValuesAction} />;
}

async function listedShots(context: ActorContext, input: ListShotsInput) {
  const { show, q, asset, state } = input;
  const page = await listShots(context, input);
  if (page.items.length === 0) return <EmptyState title="No shot fits">Clear a filter to see the others.</EmptyState>;
  const next = new URLSearchParams({ ...(q ? { q } : {}), ...(asset ? { asset } : {}), ...(state ? { state } : {}), cursor: page.next_cursor ?? '' });
  return (
    <>
      <ShotTable show={show} shots={page.items} />
      {page.next_cursor === null ? null : (
        <nav aria-label="Pages" className="px-4 py-5 md:px-6">
          <Button asChild>
            <Link href={`${shotsHref(show)}?${next}`}>More shots</Link>
          </Button>
        </nav>
      )}
    </>
  );
}
