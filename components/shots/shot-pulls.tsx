import { Section } from '@/components/parts/facts';
import { When } from '@/components/users/when';
import type { ShotPull } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';

/** Who took the shot's rows, and whether they hold what is locked now. */
export function ShotPulls({ pulls }: { pulls: readonly ShotPull[] }) {
  return (
    <Section title="Taken by">
      {pulls.length === 0 ? (
        <p className="text-13 text-ink-2">Nobody yet.</p>
      ) : (
        <ul className="flex flex-col gap-2 text-13">
          {pulls.map((pull) => (
            <li key={pull.id}>
              <span className="flex items-baseline justify-between gap-3">
                <span>
                  {pull.taken_by}
                  {pull.token === null ? null : <span className="text-ink-3"> by token {pull.token}</span>}
                </span>
                <span className={pull.current ? 'text-verdigris' : 'text-ink-2'}>{pull.current ? 'as locked now' : 'older rows'}</span>
              </span>
              <span className="flex flex-wrap items-baseline justify-between gap-x-3 text-ink-3">
                <When at={pull.taken_at} />
                <span>
                  {counted(pull.rows, 'row')}, {pull.format.toUpperCase()},{' '}
                  <span className="font-mono" title={pull.sha256} data-full={pull.sha256}>
                    {pull.sha256.slice(0, 8)}
                  </span>
                </span>
              </span>
            </li>
          ))}
        </ul>
      )}
    </Section>
  );
}
