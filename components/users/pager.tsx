import Link from 'next/link';
import { Button } from '@/components/ui/button';

/** Ways to newer and older pages of a list. */
export function Pager({ newerHref, olderHref }: { newerHref: string | null; olderHref: string | null }) {
  if (newerHref === null && olderHref === null) return null;
  return (
    <nav aria-label="Pages" className="flex gap-2 px-4 py-5 md:px-6">
      {newerHref === null ? null : (
        <Button asChild>
          <Link href={newerHref}>Newer</Link>
        </Button>
      )}
      {olderHref === null ? null : (
        <Button asChild>
          <Link href={olderHref}>Older</Link>
        </Button>
      )}
    </nav>
  );
}
