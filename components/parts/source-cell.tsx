import { cn } from '@/components/ui/cn';
import type { PartRow } from '@/lib/rules/part-row';
import { sourceSentence, sourceWord } from '@/lib/rules/source-words';

/** Letters that one line holds; a longer source takes two smaller lines. */
const SHORT = 19;

/** What the mass comes from; where a problem forbids one, that problem. The inspector has either in full. */
export function SourceCell({ row }: { row: PartRow }) {
  if (row.state === 'blocked') {
    const problem = row.problems.find((finding) => finding.severity === 'problem');
    return (
      <span className="line-clamp-2 text-12 leading-3.5 text-wrong" title={problem?.message}>
        {problem?.message ?? 'blocked'}
      </span>
    );
  }
  const word = sourceWord(row);
  return (
    <span
      className={cn('text-13 text-ink-2', word !== null && word.length > SHORT && 'line-clamp-2 text-12 leading-3.5')}
      title={word === null ? undefined : sourceSentence(row)}
    >
      {word ?? <span className="text-ink-3">–</span>}
    </span>
  );
}
