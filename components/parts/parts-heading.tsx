import Link from 'next/link';
import { PageHeading } from '@/components/shell/page-heading';
import { ProgressRule } from '@/components/states/progress-rule';
import { Button } from '@/components/ui/button';
import type { PartCounts } from '@/lib/rules/part-row';
import type { ShowFrame } from '@/lib/rules/show-frame';

interface PartsHeadingProps {
  frame: ShowFrame;
  counts: PartCounts | null;
  canSet: boolean;
  onSet: () => void;
}

/** How far the show is, and what is done most. */
export function PartsHeading({ frame, counts, canSet, onSet }: PartsHeadingProps) {
  const show = encodeURIComponent(frame.code);
  return (
    <PageHeading
      title="Parts"
      measure={counts === null ? <span className="block h-8.5" /> : <ProgressRule counts={counts.by_state} />}
      actions={
        <>
          {frame.may_set ? (
            <Button disabled={!canSet} onClick={onSet}>
              Set mass
            </Button>
          ) : null}
          <Button asChild>
            <a href={`/api/v1/shows/${show}/export.csv`} download>
              Export CSV
            </a>
          </Button>
          {frame.may_import ? (
            <Button look="filled" asChild>
              <Link href={`/shows/${show}/import`}>Import cages</Link>
            </Button>
          ) : null}
        </>
      }
    />
  );
}
