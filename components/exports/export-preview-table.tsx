import { EmptyState } from '@/components/ui/empty-state';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ExportPreview } from '@/lib/rules/export-preview';

/** The first rows of the file, every cell as it will stand there. */
export function ExportPreviewTable({ preview }: { preview: ExportPreview }) {
  const { columns, rows, total, without_mass: withoutMass } = preview;
  if (total === 0) return <EmptyState title="No rows">Nothing in the show has what the filters ask for. Left-out parts are in no export.</EmptyState>;
  return (
    <>
      <p className="px-4 py-3 text-14 text-ink-2 md:px-6">
        {total.toLocaleString('en')} {total === 1 ? 'row' : 'rows'}, SI units, in the axes of each asset.{' '}
        {withoutMass > 0 ? `${withoutMass.toLocaleString('en')} without a mass ${withoutMass === 1 ? 'has' : 'have'} empty cells. ` : null}
        {rows.length < total ? `The first ${rows.length}:` : null}
      </p>
      <div tabIndex={0} role="region" aria-label="First rows" className="overflow-x-auto">
        <Table>
          <thead>
            <tr>
              {columns.map((name) => (
                <TableHead key={name} className="font-mono">
                  {name}
                </TableHead>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((cells, i) => (
              <TableRow key={i}>
                {cells.map((cell, j) => (
                  <TableCell key={columns[j]} className="max-w-80 truncate font-mono text-13" title={cell.length > 40 ? cell : undefined}>
                    {cell}
                  </TableCell>
                ))}
              </TableRow>
            ))}
          </tbody>
        </Table>
      </div>
    </>
  );
}
