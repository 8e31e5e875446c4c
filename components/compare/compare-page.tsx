import Link from 'next/link';
import { ToleranceMark } from '@/components/approvals/tolerance-mark';
import { Moment } from '@/components/ui/moment';
import type { ComparedSide, ComparisonAnswer } from '@/lib/rules/comparison';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { CompareChoices } from './compare-choices';
import { CompareViewer } from './compare-viewer';
import { DifferenceTable } from './difference-table';

/** Two values of a part or an asset: the verdict, both surfaces, every difference. */
export function ComparePage({ frame, of }: { frame: ShowFrame; of: ComparisonAnswer }) {
  const show = `/shows/${encodeURIComponent(frame.code)}`;
  const asset = `${show}/assets/${encodeURIComponent(of.asset)}`;
  return (
    <>
      <header className="border-b border-rule px-4 py-4 md:px-6">
        <p className="text-13 text-ink-2">
          <Link href={`${show}/approvals`} className="link">
            Approvals
          </Link>{' '}
          ·{' '}
          <Link href={asset} className="link">
            {of.asset}
          </Link>
          {of.part === null ? null : (
            <>
              {' '}
              ·{' '}
              <Link href={`${asset}/${encodeURIComponent(of.part)}`} className="link">
                {of.part}
              </Link>
            </>
          )}
          {of.lock === null ? null : (
            <>
              {' '}
              ·{' '}
              <Link href={`${show}/shots/${encodeURIComponent(of.lock.shot)}`} className="link">
                {of.lock.shot}
              </Link>
            </>
          )}
        </p>
        <div className="mt-0.5 flex flex-wrap items-center gap-x-5 gap-y-1">
          <h1>{capital(of.verdict)}</h1>
          {of.beyond_tolerance === null ? null : (
            <ToleranceMark beyond={of.beyond_tolerance}>
              {of.beyond_tolerance ? 'beyond the show’s tolerance' : 'within the show’s tolerance'}
            </ToleranceMark>
          )}
        </div>
      </header>
      <CompareChoices of={of} />
      <div className="grid grid-cols-[minmax(0,1fr)] lg:min-h-0 lg:flex-1 lg:grid-cols-[minmax(0,1fr)_minmax(0,44rem)]">
        <div className="flex h-[26rem] min-w-0 flex-col lg:h-auto">
          <CompareViewer of={of} frame={frame} />
        </div>
        <aside
          aria-label="Differences"
          className="border-rule bg-bench pb-6 max-lg:border-t lg:overflow-y-auto lg:border-l"
        >
          <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1 border-b border-rule px-4 py-3 text-13">
            <SideFacts label="Before" side={of.before} />
            <SideFacts label="After" side={of.after} />
          </dl>
          <DifferenceTable of={of} unit={frame.linear_unit} />
        </aside>
      </div>
    </>
  );
}

function SideFacts({ label, side }: { label: string; side: ComparedSide }) {
  return (
    <>
      <dt className="text-ink-3">{label}</dt>
      <dd>
        {capital(side.name)}. <span className="text-ink-2">{side.about}</span>
        {side.by === null || side.at === null ? null : (
          <span className="text-ink-3">
            {' '}
            {side.by}, <Moment at={side.at} />
          </span>
        )}
      </dd>
    </>
  );
}

/** A version's label keeps its small letter. */
function capital(words: string): string {
  return /^v\d/.test(words) ? words : words.charAt(0).toUpperCase() + words.slice(1);
}
