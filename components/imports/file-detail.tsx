import { ProblemShape, WarningShape } from '@/components/parts/problem-counts';
import { REMARKS, type FileFinding, type ImportFileRow } from '@/lib/rules/import-answer';
import { MENDS, mendOf } from '@/lib/rules/import-mends';
import { placeWords } from '@/lib/rules/import-note';
import { findingHref } from './file-cells';

/** Whether a file has more to tell than its row shows. */
export function hasDetail(file: ImportFileRow): boolean {
  return file.error !== null ? file.error.code !== 'cancelled' : file.findings.length > 0 || file.remarks.some((remark) => remark !== 'unchanged');
}

/** All that is to know of one file: its error with the line of the file, its problems and warnings with a way to each, its remarks. */
export function FileDetail({ file, show }: { file: ImportFileRow; show: string }) {
  const { error } = file;
  if (error !== null) {
    return (
      <div className="flex flex-col gap-2 text-13">
        <p className="break-words">
          {error.line === null ? null : <span className="font-mono text-12 text-wrong">{placeWords(error)} </span>}
          {error.message}
        </p>
        {error.excerpt ? (
          <pre tabIndex={0} aria-label="The line of the file" className="overflow-x-auto border-l-2 border-wrong bg-bench px-3 py-2 font-mono text-12 leading-5 text-ink-2">
            {error.excerpt}
          </pre>
        ) : null}
        <p className="text-ink-2">{MENDS[mendOf(error.code)].act}</p>
      </div>
    );
  }
  const more = (file.problems ?? 0) + file.warnings - file.findings.length;
  return (
    <ul className="flex flex-col gap-1.5 text-13">
      {file.findings.map((finding, index) => (
        <FindingLine key={index} finding={finding} file={file} show={show} />
      ))}
      {more > 0 ? <li className="pl-5 text-ink-3">{`${more.toLocaleString('en')} more, all in the report.`}</li> : null}
      {file.remarks
        .filter((remark) => remark !== 'unchanged')
        .map((remark) => (
          <li key={remark} className="pl-5 text-ink-2">
            {REMARKS[remark]}
          </li>
        ))}
    </ul>
  );
}

function FindingLine({ finding, file, show }: { finding: FileFinding; file: ImportFileRow; show: string }) {
  const isProblem = finding.severity === 'problem';
  return (
    <li className="flex gap-2">
      <span className={isProblem ? 'mt-1 text-wrong' : 'mt-1 text-ink-2'}>{isProblem ? <ProblemShape /> : <WarningShape />}</span>
      <span className="min-w-0 break-words">
        <span className="sr-only">{isProblem ? 'Problem: ' : 'Warning: '}</span>
        {file.asset === null ? null : (
          <>
            {/* A load of the page, since a move within the program marks no target. */}
            <a className="link font-mono text-12" href={findingHref(show, file.asset, finding.part, finding.code)}>
              {finding.part ?? file.asset}
            </a>{' '}
          </>
        )}
        {finding.message}
        {finding.line === null ? null : <span className="font-mono text-12 text-ink-3"> line {finding.line}</span>}
      </span>
    </li>
  );
}
