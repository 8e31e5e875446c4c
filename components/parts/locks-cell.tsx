import Link from 'next/link';
import { StateShape } from '@/components/states/state-mark';
import { shotsHref } from '@/components/shots/shot-hrefs';

interface LocksCellProps {
  show: string;
  asset: string;
  /** Shots that have it locked, and how many of these are out of date. */
  lockedIn: number;
  outdatedIn: number;
}

/** In how many shots something is locked, and in how many of them it is out of date; leads to those shots. */
export function LocksCell({ show, asset, lockedIn, outdatedIn }: LocksCellProps) {
  if (lockedIn === 0) return <span className="text-13 text-ink-3">–</span>;
  const words = outdatedIn > 0 ? `${outdatedIn} of ${lockedIn} ${lockedIn === 1 ? 'shot' : 'shots'} out of date` : `locked in ${lockedIn} ${lockedIn === 1 ? 'shot' : 'shots'}`;
  return (
    <Link
      href={`${shotsHref(show)}?asset=${encodeURIComponent(asset)}${outdatedIn > 0 ? '&state=outdated' : ''}`}
      title={words}
      tabIndex={-1}
      className="inline-flex items-center gap-1.5 text-13 hover:underline hover:decoration-brass hover:underline-offset-3"
    >
      <span className="sr-only">{words}</span>
      <StateShape state={outdatedIn > 0 ? 'outdated' : 'locked'} className={outdatedIn > 0 ? undefined : 'text-pewter'} />
      <span aria-hidden className={outdatedIn > 0 ? undefined : 'text-pewter'}>
        {outdatedIn > 0 ? `${outdatedIn} of ${lockedIn}` : lockedIn}
      </span>
    </Link>
  );
}
