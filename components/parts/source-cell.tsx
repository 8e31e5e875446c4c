import type { PartRow } from '@/lib/rules/part-row';
import { sourceSentence, sourceWord } from '@/lib/rules/source-words';

/** What the mass comes from; where a problem forbids one, that problem. The inspector has either in full. */
export function SourceCell({ row }: { row: PartRow }) {
  if (row.state === 'blocked') {
    const problem = row.problems.find((finding) => finding.severity === 'problem');
    return (
      <span className="truncate text-13 text-wrong" title={problem?.message}>
        {problem?.message ?? 'blocked'}
      </span>
    );
  }
  const word = sourceWord(row);
  return (
    <span className="truncate text-13 text-ink-2" title={word === null ? undefined : sourceSentence(row)}>
      {word ?? <span className="text-ink-3">–</span>}
    </span>
  );
}
