import type { ReactNode } from 'react';
import { Figure } from '@/components/ui/figure';

export function Section({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="border-t border-rule px-4 py-3">
      <h3 className="mb-1.5 text-12 text-ink-3">{title}</h3>
      {children}
    </section>
  );
}

export interface Fact {
  label: ReactNode;
  unit?: string;
  value: number | string | null;
  notation?: 'fixed' | 'engineering';
  decimals?: number;
}

const ENGINEERING = { before: 5, after: 5 };
const FIXED = { before: 5, after: 5 };

/** Labels with their unit at the left, figures under one another on the point at the right. */
export function Facts({ facts }: { facts: readonly Fact[] }) {
  return (
    <dl className="text-13">
      {facts.map((fact, index) => (
        <div key={index} className="flex min-h-6 items-baseline justify-between gap-4">
          <dt className="text-ink-2">
            {fact.label}
            {fact.unit === undefined ? null : <span className="text-ink-3">, {fact.unit}</span>}
          </dt>
          <dd className="min-w-0 text-right">
            {typeof fact.value === 'string' ? (
              <span className="inline-block pr-8.5 break-words">{fact.value}</span>
            ) : fact.notation === 'fixed' ? (
              <>
                <Figure value={fact.value} decimals={fact.decimals ?? 3} align={FIXED} />
                <span aria-hidden className="inline-block w-8.5" />
              </>
            ) : (
              <Figure value={fact.value} notation="engineering" align={ENGINEERING} />
            )}
          </dd>
        </div>
      ))}
    </dl>
  );
}
