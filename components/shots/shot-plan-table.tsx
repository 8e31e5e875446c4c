import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ShotListError } from '@/lib/rules/parse-shot-list';
import type { ShotPlan } from '@/lib/rules/shot-detail';
import { assetsWords } from './assets-words';

const MOST_ROWS = 200;

/** Lines that cannot be read, each with its place. */
export function ShotListErrors({ errors }: { errors: readonly ShotListError[] }) {
  return (
    <ul aria-label="Lines to mend" tabIndex={0} className="max-h-60 overflow-y-auto border-y border-rule py-1.5 text-13">
      {errors.slice(0, MOST_ROWS).map((error, i) => (
        <li key={i} className="flex gap-3 py-0.5">
          <span className="w-36 shrink-0 font-mono text-ink-3">
            line {error.line}
            {error.column === 0 ? '' : `, column ${error.column}`}
          </span>
          <span className="text-wrong">{error.message}</span>
        </li>
      ))}
      {errors.length > MOST_ROWS ? <li className="py-0.5 text-ink-3">{errors.length - MOST_ROWS} more</li> : null}
    </ul>
  );
}

/** What the list would make. */
export function ShotPlanTable({ items }: { items: ShotPlan['items'] }) {
  return (
    <div className="max-h-72 overflow-y-auto border-y border-rule">
      <Table>
        <thead>
          <tr>
            <TableHead>Sequence</TableHead>
            <TableHead>Shot</TableHead>
            <TableHead>In the show</TableHead>
            <TableHead className="w-full">Added</TableHead>
          </tr>
        </thead>
        <tbody>
          {items.slice(0, MOST_ROWS).map((item) => (
            <TableRow key={item.code}>
              <TableCell className="text-ink-2">{item.sequence}</TableCell>
              <TableCell>{item.code}</TableCell>
              <TableCell className="text-13 text-ink-2">{item.fresh ? 'new' : item.adds.length > 0 ? 'there, gets more' : 'as it is'}</TableCell>
              <TableCell className="text-13 whitespace-normal text-ink-2">{item.adds.length === 0 ? '–' : assetsWords(item.adds)}</TableCell>
            </TableRow>
          ))}
        </tbody>
      </Table>
      {items.length > MOST_ROWS ? <p className="px-2.5 py-2 text-13 text-ink-3">{(items.length - MOST_ROWS).toLocaleString('en')} more</p> : null}
    </div>
  );
}
