import { Moment } from '@/components/ui/moment';
import type { PartRow } from '@/lib/rules/part-row';
import { setByWords } from '@/lib/rules/source-words';

/** Who set the value, from where and when. */
export function SetBy({ row }: { row: PartRow }) {
  const words = setByWords(row);
  if (words === null) return null;
  return (
    <p className="text-13 text-ink-3">
      {words}
      {row.set_at === null ? null : (
        <>
          , <Moment at={row.set_at} />
        </>
      )}
    </p>
  );
}
