import { notFound } from 'next/navigation';
import type { ActorContext } from '@/lib/context';
import type { ComparisonAnswer } from '@/lib/rules/comparison';
import { getComparisonInput } from '@/lib/rules/inputs/get-comparison';
import { orNotFound } from '@/lib/shows/or-not-found';
import { getComparison } from './get-comparison';

/** The comparison that an address asks for; one that names nothing of the show is the page for such addresses. */
export function getPageComparison(context: ActorContext, show: string, query: Record<string, string | string[] | undefined>): Promise<ComparisonAnswer> {
  const given = Object.fromEntries(Object.entries(query).filter(([, value]) => value !== undefined && value !== ''));
  const input = getComparisonInput.safeParse({ ...given, show });
  return input.success ? orNotFound(getComparison(context, input.data)) : notFound();
}
