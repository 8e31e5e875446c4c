import Link from 'next/link';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { Skeleton } from '@/components/ui/skeleton';
import type { ShowFrame } from '@/lib/rules/show-frame';

const PLACES = Array.from({ length: 18 }, (_, index) => index);

/** Places for the rows that are being read. */
export function TableSkeleton() {
  return (
    <div className="min-h-0 flex-1 overflow-hidden" role="status" aria-label="Reading parts">
      {PLACES.map((place) => (
        <div
          key={place}
          className={
            place % 6 === 0
              ? 'flex h-9.5 items-center gap-8 border-b border-rule bg-bench px-4'
              : 'flex h-8 items-center gap-8 border-b border-rule px-4 pl-9'
          }
        >
          <Skeleton className={place % 6 === 0 ? 'w-36' : 'w-28'} />
          <Skeleton className="ml-auto w-16 max-md:hidden" />
          <Skeleton className="h-1 w-40" />
          <Skeleton className="w-48 max-md:hidden" />
          <Skeleton className="w-20" />
        </div>
      ))}
    </div>
  );
}

export function NoParts({ frame }: { frame: ShowFrame }) {
  return (
    <EmptyState
      title="No cages yet"
      action={
        frame.may_import ? (
          <Button asChild>
            <Link href={`/shows/${encodeURIComponent(frame.code)}/import`}>Import cages</Link>
          </Button>
        ) : null
      }
    >
      {frame.may_import
        ? 'Import the show’s control cages. Each part appears here with its volume and waits for its mass.'
        : 'Nothing has been imported into this show.'}
    </EmptyState>
  );
}

export function NothingFits({ onClear }: { onClear: () => void }) {
  return (
    <EmptyState title="No part fits" action={<Button onClick={onClear}>Clear the filters</Button>}>
      Nothing in the show has all of what the filters ask for.
    </EmptyState>
  );
}

export function NotRead({ message, onRetry }: { message: string; onRetry: () => void }) {
  return (
    <EmptyState title="The parts could not be read" action={<Button onClick={onRetry}>Read again</Button>}>
      {message}
    </EmptyState>
  );
}
