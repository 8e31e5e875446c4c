import Link from 'next/link';
import { Button } from '@/components/ui/button';
import { LINK_WORDS } from '@/lib/rules/link-words';

/** What is said about a link that leads nowhere any more, with the way on. */
export function SpentLink({ purpose, state }: { purpose: 'invite' | 'reset'; state: 'used' | 'expired' | 'unknown' }) {
  return (
    <div className="flex flex-col items-start gap-4">
      <p className="text-14 text-ink-2">{LINK_WORDS[purpose][state]}</p>
      <div className="flex flex-wrap gap-2">
        {purpose === 'reset' ? (
          <Button asChild>
            <Link href="/reset">Ask for a new link</Link>
          </Button>
        ) : null}
        <Button asChild look="quiet">
          <Link href="/sign-in">Sign in</Link>
        </Button>
      </div>
    </div>
  );
}
