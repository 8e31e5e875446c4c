'use client';

import { X } from 'lucide-react';
import Link from 'next/link';
import { StateShape } from '@/components/states/state-mark';
import { IconButton } from '@/components/ui/icon-button';
import { groupMissing, type LockShotsAnswer, type MissingGroup } from '@/lib/rules/lock-answers';
import { counted } from '@/lib/rules/shot-words';

const MOST_NAMED = 4;

/** What locking came to: how many, and what is missing and why. It stays until it is put away or the next act. */
export function LockReport({ show, answer, onClose }: { show: string; answer: LockShotsAnswer | null; onClose: () => void }) {
  return (
    <div role="status" className="empty:hidden">
      {answer === null ? null : (
        <div className="flex items-start gap-3 border-b border-rule bg-raised px-4 py-2.5 md:px-6">
          <StateShape state="locked" className="mt-[3px] text-pewter" />
          <div className="min-w-0 flex-1 text-14">
            <p className="font-medium">
              {answer.locked === 0 ? 'Nothing new was locked.' : `${counted(answer.locked, 'part')} locked.`}{' '}
              {answer.missing.length === 0 ? 'Nothing is missing.' : `${answer.missing.length.toLocaleString('en')} missing:`}
            </p>
            {answer.missing.length === 0 ? null : (
              <ul className="mt-1 text-13 text-ink-2">
                {groupMissing(answer.missing).map((group) => (
                  <li key={`${group.why} ${group.asset}`}>
                    <Link href={`/shows/${encodeURIComponent(show)}?q=${encodeURIComponent(group.asset)}`} className="link">
                      {group.asset}
                    </Link>{' '}
                    {named(group)}: {group.why}
                  </li>
                ))}
              </ul>
            )}
          </div>
          <IconButton label="Put away" onClick={onClose}>
            <X aria-hidden />
          </IconButton>
        </div>
      )}
    </div>
  );
}

function named({ parts, shots }: MissingGroup): string {
  const first = parts.length > MOST_NAMED + 1 ? `${parts.slice(0, MOST_NAMED).join(', ')} and ${parts.length - MOST_NAMED} more` : parts.join(', ');
  return shots.length > 1 ? `${first} in ${counted(shots.length, 'shot')}` : first;
}
