import { Figure } from '@/components/ui/figure';
import type { PartRow } from '@/lib/rules/part-row';
import { METRES_PER, type LinearUnit } from '@/lib/rules/units';

/** The construction, and for what has a wall its thickness in the header's unit. */
export function ConstructionCell({ row, unit }: { row: PartRow; unit: LinearUnit }) {
  return (
    <span className="text-13 text-ink-2">
      {row.construction}
      {row.wall_m === null || row.construction === 'solid' ? null : (
        <>
          {' '}
          <Figure value={row.wall_m / METRES_PER[unit]} />
        </>
      )}
    </span>
  );
}
