import { StateShape } from '@/components/states/state-mark';
import { cn } from '@/components/ui/cn';
import { shotState, shotVerdict, type ShotState, type Standing } from '@/lib/rules/shot-words';
import type { RowState } from '@/lib/rules/states';

const SHAPE: Record<ShotState, RowState> = { complete: 'locked', missing: 'unset', outdated: 'outdated', empty: 'left_out' };
const INK: Record<ShotState, string> = { complete: 'text-pewter', missing: 'text-ink', outdated: 'text-ink', empty: 'text-ink-3' };

/** The verdict on a shot, or on an asset in it: shape and words. Missing and out of date have a shape each where both are true. */
export function ShotMark({ of, className }: { of: Standing; className?: string }) {
  const state = shotState(of);
  return (
    <span className={cn('inline-flex items-center gap-1.5 align-middle text-13 whitespace-nowrap', INK[state], className)}>
      <StateShape state={SHAPE[state]} className={state === 'missing' ? 'text-ink-2' : undefined} />
      {of.missing > 0 && of.outdated > 0 ? <StateShape state="outdated" className="-ml-0.5" /> : null}
      {shotVerdict(of)}
    </span>
  );
}
