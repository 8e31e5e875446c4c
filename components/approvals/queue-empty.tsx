import Link from 'next/link';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import type { QueueCounts, QueueFilter } from '@/lib/rules/approval-queue';
import type { ShowFrame } from '@/lib/rules/show-frame';

const WORDS: Record<QueueFilter, { title: string; text: string }> = {
  waiting: { title: 'Nothing waits', text: 'Every value of the show is approved, or has no mass yet.' },
  asked: { title: 'Nobody asks', text: 'A question appears here as soon as somebody asks for an approval.' },
  outdated: { title: 'Nothing is out of date', text: 'Every approved value is still the current one.' },
  approved: {
    title: 'Nothing is approved yet',
    text: 'What a lead approves appears here, and can be locked for shots.',
  },
};

interface QueueEmptyProps {
  frame: ShowFrame;
  filter: QueueFilter;
  counts: QueueCounts | null;
  onFilter: (filter: QueueFilter | null) => void;
}

/** Why nothing is here, and where to go on. */
export function QueueEmpty({ frame, filter, counts, onFilter }: QueueEmptyProps) {
  const { title, text } = WORDS[filter];
  const waiting = counts?.waiting ?? 0;
  return (
    <EmptyState
      title={title}
      action={
        filter !== 'waiting' && waiting > 0 ? (
          <Button onClick={() => onFilter(null)}>
            {waiting === 1 ? 'See the one that waits' : `See the ${waiting.toLocaleString('en')} that wait`}
          </Button>
        ) : (
          <Button asChild>
            <Link href={`/shows/${encodeURIComponent(frame.code)}`}>To the parts</Link>
          </Button>
        )
      }
    >
      {text}
    </EmptyState>
  );
}
