import { Chip } from '@/components/ui/chip';
import { QUEUE_FILTERS, QUEUE_FILTER_WORDS, type QueueCounts, type QueueFilter } from '@/lib/rules/approval-queue';
import type { ShowFrame } from '@/lib/rules/show-frame';

interface QueueToolbarProps {
  frame: ShowFrame;
  counts: QueueCounts | null;
  filter: QueueFilter;
  onFilter: (filter: QueueFilter) => void;
}

/** What the queue shows; the choice goes into the address. */
export function QueueToolbar({ frame, counts, filter, onFilter }: QueueToolbarProps) {
  return (
    <div
      role="group"
      aria-label="Filters"
      className="flex items-center gap-2 border-b border-rule bg-bench px-4 py-1.5 md:px-6"
    >
      <div className="flex min-w-0 flex-1 gap-2 overflow-x-auto py-0.5">
        {QUEUE_FILTERS.map((one) => (
          <Chip key={one} pressed={filter === one} count={counts?.[one]} onClick={() => onFilter(one)}>
            {QUEUE_FILTER_WORDS[one]}
          </Chip>
        ))}
      </div>
      <p className="text-14 whitespace-nowrap text-ink-3 max-lg:hidden">
        {frame.linear_unit} · kg · {frame.up_axis} up
      </p>
    </div>
  );
}
