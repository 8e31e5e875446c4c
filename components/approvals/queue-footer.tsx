import type { QueueCounts, QueueFilter } from '@/lib/rules/approval-queue';

interface QueueFooterProps {
  shown: number;
  counts: QueueCounts | null;
  filter: QueueFilter;
  chosen: number;
  mayApprove: boolean;
  onKeys: () => void;
}

/** How much is shown of what there is, and the keys at hand. */
export function QueueFooter({ shown, counts, filter, chosen, mayApprove, onKeys }: QueueFooterProps) {
  const all = counts?.[filter] ?? shown;
  return (
    <footer className="flex h-9 shrink-0 items-center gap-6 border-t border-rule bg-bench px-4 text-12 whitespace-nowrap text-ink-2 md:px-6">
      <p role="status">
        {shown < all
          ? `${shown.toLocaleString('en')} of ${all.toLocaleString('en')} values read`
          : `${all.toLocaleString('en')} ${all === 1 ? 'value' : 'values'}`}
        {chosen > 0 ? ` · ${chosen.toLocaleString('en')} chosen` : ''}
      </p>
      <p className="ml-auto text-ink-3 max-lg:hidden">
        j k move · {mayApprove ? 'a approves · n with a note · ' : ''}x chooses · c compares ·{' '}
        <button type="button" onClick={onKeys} className="text-ink-2 hover:text-ink">
          ? keys
        </button>
      </p>
    </footer>
  );
}
