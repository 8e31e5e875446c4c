import { StateMark } from '@/components/states/state-mark';
import { Button } from '@/components/ui/button';
import type { PartNode } from '@/lib/rules/arrange-parts';
import { VALUE_STATES, type RowState } from '@/lib/rules/states';
import { Facts, Section } from './facts';
import { massFact } from './weight-facts';

const STATES: readonly RowState[] = ['locked', ...VALUE_STATES];

/** Several rows at once: what they weigh together and how they stand. */
export function SelectionSummary({ parts, onSet, onAsk }: { parts: readonly PartNode[]; onSet: (() => void) | null; onAsk: (() => void) | null }) {
  const rows = parts.map((part) => part.row);
  const weighed = rows.filter((row) => row.mass_kg !== null);
  const assets = new Set(rows.map((row) => row.asset)).size;
  const mass = weighed.reduce((sum, row) => sum + (row.mass_kg ?? 0), 0);
  return (
    <>
      <header className="px-4 pt-3 pb-2">
        <h2>{rows.length === 1 ? 'One part' : `${rows.length.toLocaleString('en')} parts`}</h2>
        <p className="text-13 text-ink-2">
          of {assets === 1 ? rows[0].asset : `${assets.toLocaleString('en')} assets`}
        </p>
      </header>
      {onSet === null && onAsk === null ? null : (
        <div className="flex flex-wrap gap-2 px-4 pb-3">
          {onSet === null ? null : (
            <Button size="small" onClick={onSet}>
              Set mass
            </Button>
          )}
          {onAsk === null ? null : (
            <Button size="small" onClick={onAsk}>
              Ask for approval
            </Button>
          )}
        </div>
      )}
      <Section title="Together">
        <Facts
          facts={[
            massFact(weighed.length === 0 ? null : mass),
            { label: 'Without mass', value: (rows.length - weighed.length).toLocaleString('en') },
          ]}
        />
      </Section>
      <Section title="States">
        <ul className="flex flex-col gap-1">
          {STATES.map((state) => {
            const count = rows.filter((row) => row.state === state).length;
            return count === 0 ? null : (
              <li key={state} className="flex justify-between text-13">
                <StateMark state={state} />
                {count.toLocaleString('en')}
              </li>
            );
          })}
        </ul>
      </Section>
    </>
  );
}
