import { ToleranceMark } from '@/components/approvals/tolerance-mark';
import { cn } from '@/components/ui/cn';
import { ENGINEERING_WIDTHS, Figure } from '@/components/ui/figure';
import type { ComparisonAnswer } from '@/lib/rules/comparison';
import { differenceGroups, isBeyond, type DifferenceLine } from '@/lib/rules/difference-rows';
import type { LinearUnit } from '@/lib/rules/units';

const PERCENT = { before: 4, after: 4 };

/** Everything that is compared, before and after; what is beyond the show's tolerance is marked by shape and word. */
export function DifferenceTable({ of, unit }: { of: ComparisonAnswer; unit: LinearUnit }) {
  return (
    <div className="overflow-x-auto" tabIndex={0} role="group" aria-label="Differences">
      <table className="w-full border-collapse text-13">
        <thead>
          <tr className="sticky top-0 z-1 bg-bench">
            <Head className="pl-4 text-left">Quantity</Head>
            <Head className="pr-11">Before</Head>
            <Head className="pr-11">After</Head>
            <Head className="pr-11">Difference</Head>
            <Head>Difference, %</Head>
            <Head className="pr-4 text-left">Tolerance</Head>
          </tr>
        </thead>
        {differenceGroups(of, unit).map((group) => (
          <tbody key={group.title}>
            <tr>
              <th
                scope="rowgroup"
                colSpan={6}
                className="border-b border-rule px-4 pt-4 pb-1 text-left text-12 font-normal text-ink-3"
              >
                {group.title} · % {group.percentOf}
              </th>
            </tr>
            {group.lines.map((line) => (
              <Line key={line.key} line={line} />
            ))}
          </tbody>
        ))}
      </table>
    </div>
  );
}

function Head({ className, children }: { className?: string; children: string }) {
  return (
    <th
      scope="col"
      className={cn(
        'h-9 border-b border-rule px-2 text-right text-12 font-normal whitespace-nowrap text-ink-3',
        className,
      )}
    >
      {children}
    </th>
  );
}

function Line({ line }: { line: DifferenceLine }) {
  const beyond = isBeyond(line);
  const alone = line.before === null && line.after === null;
  return (
    <tr className={cn('h-7 border-b border-rule', beyond && 'bg-selected')}>
      <th scope="row" className="pr-2 pl-4 text-left font-normal text-ink-2">
        {line.label}
        {line.unit === null ? null : <span className="text-ink-3">, {line.unit}</span>}
      </th>
      <td className="px-1 text-right">{alone ? null : <Amount value={line.before} line={line} />}</td>
      <td className="px-1 text-right">{alone ? null : <Amount value={line.after} line={line} />}</td>
      <td className="px-1 text-right">
        {line.difference === null && alone ? null : <Amount value={line.difference} line={line} />}
      </td>
      <td className="px-2 text-right">
        {line.percent === null ? null : <Figure value={line.percent} decimals={3} align={PERCENT} />}
      </td>
      <td className="pr-4 pl-2">
        {beyond === null ? null : (
          <ToleranceMark beyond={beyond}>
            {beyond ? 'beyond' : 'within'} {line.limitPercent} %
          </ToleranceMark>
        )}
      </td>
    </tr>
  );
}

/** A figure with the place of an exponent behind it, so that a column keeps its points under one another. */
function Amount({ value, line }: { value: number | null; line: DifferenceLine }) {
  if (line.notation === 'engineering')
    return (
      <Figure
        value={value !== null && Math.abs(value) < line.noise ? 0 : value}
        full={value}
        notation="engineering"
        align={ENGINEERING_WIDTHS}
      />
    );
  return (
    <>
      <Figure value={value} decimals={3} align={ENGINEERING_WIDTHS} />
      <span aria-hidden className="inline-block w-8.5" />
    </>
  );
}
