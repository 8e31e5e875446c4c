'use client';

import Link from 'next/link';
import { RowBeam } from '@/components/beam/row-beam';
import { StateMark } from '@/components/states/state-mark';
import { Button } from '@/components/ui/button';
import type { AssetNode, PartNode, TableNode } from '@/lib/rules/arrange-parts';
import { rowName } from '@/lib/rules/part-key';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { CATEGORY_WORDS } from '@/lib/rules/states';
import { sourceSentence } from '@/lib/rules/source-words';
import { Facts, Section } from './facts';
import { Findings } from './findings';
import { GeometryFacts } from './geometry-facts';
import { partHref } from './part-href';
import { SelectionSummary } from './selection-summary';
import { SetBy } from './set-by';
import { massFact, WeightFacts } from './weight-facts';

interface InspectorProps {
  /** The row that the keyboard stands on. */
  active: TableNode | null;
  /** The parts that an act would change. */
  chosen: readonly PartNode[];
  /** All parts that the filters leave. */
  shown: readonly PartNode[];
  frame: ShowFrame;
  onSet: () => void;
  /** Null where nothing chosen can be asked for. */
  onAsk: (() => void) | null;
}

/** Everything about what is chosen, with its units beside the labels. */
export function Inspector({ active, chosen, shown, frame, onSet, onAsk }: InspectorProps) {
  const one = chosen.length === 1 ? chosen[0] : null;
  if (active?.kind === 'asset' && chosen.length === active.parts.length)
    return <AssetFacts node={active} frame={frame} onSet={onSet} onAsk={onAsk} />;
  if (one !== null) return <PartFacts node={one} frame={frame} onSet={onSet} onAsk={onAsk} />;
  if (chosen.length > 1) return <SelectionSummary parts={chosen} onSet={frame.may_set ? onSet : null} onAsk={onAsk} />;
  return (
    <>
      <SelectionSummary parts={shown} onSet={null} onAsk={null} />
      <Section title="Rows">
        <p className="text-13 text-ink-2">Choose a row to see all of its numbers. Several rows can be set at once.</p>
      </Section>
    </>
  );
}

type ActsProps = Pick<InspectorProps, 'frame' | 'onSet' | 'onAsk'>;

function Acts({ frame, onSet, onAsk, href }: ActsProps & { href?: string }) {
  return (
    <div className="flex flex-wrap gap-2 px-4 pb-3">
      {frame.may_set ? (
        <Button size="small" onClick={onSet}>
          Set mass
        </Button>
      ) : null}
      {onAsk === null ? null : (
        <Button size="small" onClick={onAsk}>
          Ask for approval
        </Button>
      )}
      {href === undefined ? null : (
        <Button size="small" look="quiet" asChild>
          <Link href={href}>Open part</Link>
        </Button>
      )}
    </div>
  );
}

function PartFacts({ node, frame, onSet, onAsk }: ActsProps & { node: PartNode }) {
  const { row } = node;
  return (
    <>
      <header className="px-4 pt-3 pb-2">
        <h2 className="break-words">{rowName(row)}</h2>
        <p className="flex flex-wrap items-center gap-x-3 text-13 text-ink-2">
          {row.asset}
          <span className="font-mono">{row.version}</span>
          <StateMark state={row.state} />
        </p>
      </header>
      <Acts frame={frame} onSet={onSet} onAsk={onAsk} href={partHref(frame.code, row)} />
      {row.problems.length === 0 ? null : (
        <Section title="Problems and warnings">
          <Findings findings={row.problems} />
        </Section>
      )}
      <Section title="Balance along the longest axis">
        <RowBeam of={row} unit={frame.linear_unit} partner={node.partner} />
      </Section>
      <Section title="Mass">
        <Facts facts={[massFact(row.mass_kg), { label: 'Construction', value: row.construction }]} />
        <p className="mt-1 text-13 text-ink-2">{sourceSentence(row)}</p>
        <SetBy row={row} />
      </Section>
      <WeightFacts of={row} unit={frame.linear_unit} />
      <Section title="Limit surface">
        <GeometryFacts row={row} unit={frame.linear_unit} />
      </Section>
    </>
  );
}

function AssetFacts({ node, frame, onSet, onAsk }: ActsProps & { node: AssetNode }) {
  const { total } = node;
  return (
    <>
      <header className="px-4 pt-3 pb-2">
        <h2 className="break-words">{total.asset}</h2>
        <p className="flex flex-wrap items-center gap-x-3 text-13 text-ink-2">
          {CATEGORY_WORDS[total.category]}
          <span className="font-mono">{total.version}</span>
          <StateMark state={total.state} />
        </p>
      </header>
      <Acts frame={frame} onSet={onSet} onAsk={onAsk} />
      <Section title="Balance along the longest axis">
        <RowBeam of={total} unit={frame.linear_unit} />
      </Section>
      <Section title="Mass of its parts together">
        <Facts
          facts={[
            massFact(total.mass_kg),
            { label: 'Parts', value: total.parts.toLocaleString('en') },
            { label: 'Without mass', value: total.without_mass.toLocaleString('en') },
          ]}
        />
      </Section>
      <WeightFacts of={total} unit={frame.linear_unit} />
    </>
  );
}
