import { Section } from '@/components/parts/facts';
import { When } from '@/components/users/when';
import type { ChangeSince, SinceLastPull } from '@/lib/rules/shot-detail';
import { assetInShot, counted } from '@/lib/rules/shot-words';

const MOST_CHANGES = 40;

/** What became of the shot since its reader downloaded it last. */
export function ShotSince({ since }: { since: SinceLastPull | null }) {
  return (
    <Section title="Since your last download">
      {since === null ? (
        <p className="text-13 text-ink-2">You have not taken this shot yet.</p>
      ) : (
        <>
          <p className="text-14">
            {since.changes.length === 0 ? 'Nothing changed' : `${counted(since.changes.length, 'part')} changed`} <span className="text-13 text-ink-3">since <When at={since.taken_at} /></span>
          </p>
          <ul className="mt-1 flex flex-col gap-1.5 text-13">
            {since.changes.slice(0, MOST_CHANGES).map((change) => (
              <li key={`${change.asset} ${change.copy ?? ''} ${change.part}`}>
                <span className="text-ink-2">{assetInShot(change.asset, change.copy)}</span> {change.part}: {changeWords(change)}
                <span className="block text-ink-3">
                  {change.by}, <When at={change.at} />
                  {change.reason === null ? null : `: “${change.reason}”`}
                </span>
              </li>
            ))}
            {since.changes.length > MOST_CHANGES ? <li className="text-ink-3">{since.changes.length - MOST_CHANGES} more</li> : null}
          </ul>
        </>
      )}
    </Section>
  );
}

function changeWords({ kind, verdict }: ChangeSince): string {
  if (kind === 'added') return 'locked since';
  if (kind === 'ended') return 'unlocked';
  return `re-locked, ${verdict ?? ''}`;
}
