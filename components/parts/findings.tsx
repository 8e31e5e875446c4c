import { cn } from '@/components/ui/cn';
import type { RowFinding } from '@/lib/rules/part-row';
import { ProblemShape, WarningShape } from './problem-counts';

const ORDER = { problem: 0, warning: 1, note: 2 };
const WORD = { problem: 'Problem', warning: 'Warning', note: 'Note' };

/** What was found at a part, in sentences: problems first. An address that ends in `#finding-<code>` marks the first of that code. */
export function Findings({ findings }: { findings: readonly RowFinding[] }) {
  const sorted = [...findings].sort((a, b) => ORDER[a.severity] - ORDER[b.severity]);
  return (
    <ul className="flex flex-col gap-1.5 text-13">
      {sorted.map((finding, index) => (
        <li
          key={`${finding.code} ${finding.message}`}
          id={sorted.findIndex(({ code }) => code === finding.code) === index ? `finding-${finding.code}` : undefined}
          className={cn('-mx-2 flex scroll-mt-24 gap-2 rounded px-2 target:bg-selected target:outline target:outline-brass', finding.severity === 'problem' ? 'text-wrong' : 'text-ink-2')}
        >
          <span className="mt-1 shrink-0">
            {finding.severity === 'problem' ? (
              <ProblemShape />
            ) : finding.severity === 'warning' ? (
              <WarningShape />
            ) : (
              <span aria-hidden className="inline-block w-3 text-center leading-3">
                ·
              </span>
            )}
          </span>
          <span>
            <span className="sr-only">{WORD[finding.severity]}: </span>
            {finding.message}
            {finding.count > 1 ? (
              <span className="text-ink-3"> {finding.count.toLocaleString('en')} places.</span>
            ) : null}
          </span>
        </li>
      ))}
    </ul>
  );
}
