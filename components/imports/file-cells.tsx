import Link from 'next/link';
import { ProblemShape, WarningShape } from '@/components/parts/problem-counts';
import { cn } from '@/components/ui/cn';
import { Figure } from '@/components/ui/figure';
import { doubtsUnit, LOUD_REMARKS, REMARKS, type ImportFileAnswer, type ImportFileRow } from '@/lib/rules/import-answer';
import { placeWords } from '@/lib/rules/import-note';
import { versionLabel } from '@/lib/rules/import-plan';
import { SizeFigure, standingBox } from './size-figure';

const STATE_WORDS: Record<ImportFileAnswer['state'], string> = { queued: 'waiting', reading: 'reading', measuring: 'measuring', done: 'measured', failed: 'failed' };

/** How a file ended, or how far it is. */
export function OutcomeWords({ file }: { file: ImportFileRow }) {
  if (file.state === 'failed' && file.error?.code === 'cancelled') return <span className="text-ink-3">cancelled</span>;
  if (file.state === 'failed') {
    return (
      <span className="inline-flex items-center gap-1.5 text-wrong">
        <ProblemShape />
        {STATE_WORDS.failed}
      </span>
    );
  }
  const word = file.unpacked_into ? 'unpacked' : file.remarks.includes('unchanged') ? 'unchanged' : STATE_WORDS[file.state];
  const isInHand = file.state === 'reading' || file.state === 'measuring';
  return <span className={file.state === 'done' || isInHand ? 'text-ink-2' : 'text-ink-3'}>{word}</span>;
}

const assetHref = (show: string, asset: string): string => `/shows/${encodeURIComponent(show)}/assets/${encodeURIComponent(asset)}`;

/** Address of a part's page, at this finding. */
export function findingHref(show: string, asset: string, part: string | null, code: string): string {
  return part === null ? assetHref(show, asset) : `${assetHref(show, asset)}/${encodeURIComponent(part)}#finding-${code}`;
}

/** The asset it became; fainter where its name puts it, until then. */
export function AssetLink({ file, show }: { file: ImportFileRow; show: string }) {
  const asset = file.asset ?? file.planned?.asset ?? null;
  if (asset === null || file.unpacked_into) return null;
  if (file.asset === null || file.state !== 'done') return <span className="text-ink-3">{asset}</span>;
  return (
    <Link className="link" href={assetHref(show, asset)} title={asset}>
      {asset}
    </Link>
  );
}

/** The version it became; fainter what its name says, until then. */
export function VersionLink({ file, show }: { file: ImportFileRow; show: string }) {
  if (file.version !== null && file.asset !== null) {
    return (
      <Link className="link font-mono" href={`/shows/${encodeURIComponent(show)}?q=${encodeURIComponent(file.asset)}`}>
        {file.version}
      </Link>
    );
  }
  const planned = file.planned?.version;
  return planned == null ? null : <span className="font-mono text-ink-3">{versionLabel(planned, 1)}</span>;
}

/** How many problems and warnings its measurement found. */
export function FindingCounts({ file }: { file: ImportFileRow }) {
  const problems = file.problems ?? 0;
  if (problems + file.warnings === 0) return null;
  return (
    <span className="inline-flex items-center gap-2.5">
      {problems === 0 ? null : (
        <span className="inline-flex items-center gap-1 text-wrong">
          <ProblemShape />
          {problems.toLocaleString('en')}
          <span className="sr-only">{problems === 1 ? ' problem' : ' problems'}</span>
        </span>
      )}
      {file.warnings === 0 ? null : (
        <span className="inline-flex items-center gap-1 text-ink-2">
          <WarningShape />
          {file.warnings.toLocaleString('en')}
          <span className="sr-only">{file.warnings === 1 ? ' warning' : ' warnings'}</span>
        </span>
      )}
    </span>
  );
}

/** The asset's height beside a person of 1.8 m, metres. */
export function Size({ file, upAxis }: { file: ImportFileRow; upAxis: 'y' | 'z' }) {
  if (!file.size_m) return null;
  const wrong = file.remarks.some(doubtsUnit);
  return (
    <span className="flex items-center gap-2">
      <SizeFigure size={file.size_m} upAxis={upAxis} wrong={wrong} />
      <Figure value={standingBox(file.size_m, upAxis).height} align={{ before: 4, after: 4 }} className={wrong ? 'font-medium text-wrong' : 'text-ink-2'} />
    </span>
  );
}

/** What is to know first of a file: its error with the place, why it waits, its first problem, or what deserves a look. */
export function ToKnow({ file }: { file: ImportFileRow }) {
  if (file.error) {
    const place = placeWords(file.error);
    return (
      <p className="line-clamp-2 break-words">
        {place === '' ? null : <span className="font-mono text-12 text-wrong">{place} </span>}
        {file.error.message}
      </p>
    );
  }
  if (file.trouble) return <p className="line-clamp-2 text-ink-2">{`Tried ${file.trouble.attempt === 1 ? 'once' : `${file.trouble.attempt} times`}, will be tried again. ${file.trouble.message}`}</p>;
  const remarks = file.remarks.filter((remark) => remark !== 'unchanged').sort((a, b) => Number(LOUD_REMARKS.includes(b)) - Number(LOUD_REMARKS.includes(a)));
  const finding = file.findings.at(0);
  if (finding !== undefined && !remarks.some(doubtsUnit)) {
    const more = (file.problems ?? 0) + file.warnings + remarks.length - 1;
    return (
      <p className={cn('line-clamp-2 break-words', finding.severity === 'problem' ? 'text-ink' : 'text-ink-2')}>
        {finding.message}
        {more > 0 ? <span className="text-ink-3"> And {more} more.</span> : null}
      </p>
    );
  }
  if (remarks.length === 0) return null;
  const isLoud = LOUD_REMARKS.includes(remarks[0]);
  return (
    <p className={cn('flex items-start gap-1.5', remarks.some(doubtsUnit) ? 'text-wrong' : isLoud ? 'text-ink' : 'text-ink-2')}>
      {isLoud ? (
        <span className="mt-1">
          <WarningShape />
        </span>
      ) : null}
      <span className="line-clamp-2">{remarks.map((remark) => REMARKS[remark]).join(' ')}</span>
    </p>
  );
}
