import type { RowFinding } from '@/lib/rules/part-row';

/** The shape of a warning: an open diamond, beside the blocked state's cross for a problem. */
export function WarningShape() {
  return (
    <svg
      viewBox="0 0 14 14"
      width="12"
      height="12"
      aria-hidden
      fill="none"
      stroke="currentColor"
      strokeWidth="1.5"
      className="shrink-0"
    >
      <path d="M7 1.8 12.2 7 7 12.2 1.8 7Z" />
    </svg>
  );
}

export function ProblemShape() {
  return (
    <svg
      viewBox="0 0 14 14"
      width="12"
      height="12"
      aria-hidden
      fill="none"
      stroke="currentColor"
      strokeWidth="2"
      className="shrink-0"
    >
      <path d="M3 3 11 11M11 3 3 11" />
    </svg>
  );
}

/** How many problems and warnings a row has; the sentences are its title. */
export function ProblemCounts({ findings }: { findings: readonly RowFinding[] }) {
  const problems = findings.filter((finding) => finding.severity === 'problem');
  const warnings = findings.filter((finding) => finding.severity === 'warning');
  if (problems.length + warnings.length === 0) return null;
  return (
    <span
      className="flex items-center gap-2.5 text-13"
      title={[...problems, ...warnings].map((finding) => finding.message).join('\n')}
    >
      {problems.length === 0 ? null : (
        <span className="flex items-center gap-1 text-wrong">
          <ProblemShape />
          {problems.length}
          <span className="sr-only">{problems.length === 1 ? ' problem' : ' problems'}</span>
        </span>
      )}
      {warnings.length === 0 ? null : (
        <span className="flex items-center gap-1 text-ink-2">
          <WarningShape />
          {warnings.length}
          <span className="sr-only">{warnings.length === 1 ? ' warning' : ' warnings'}</span>
        </span>
      )}
    </span>
  );
}

/** How many parts of an asset are blocked. */
export function BlockedCount({ blocked }: { blocked: number }) {
  if (blocked === 0) return null;
  return (
    <span className="flex items-center gap-1 text-13 text-wrong">
      <ProblemShape />
      {blocked.toLocaleString('en')}
      <span className="sr-only"> blocked</span>
    </span>
  );
}
