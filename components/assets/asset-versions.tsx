import { Moment } from '@/components/ui/moment';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { AssetVersionEntry } from '@/lib/rules/part-detail';

/** Every version of an asset, newest first. */
export function AssetVersions({ versions }: { versions: readonly AssetVersionEntry[] }) {
  return (
    <Table>
      <thead>
        <tr>
          <TableHead>Version</TableHead>
          <TableHead className="text-right">Faces</TableHead>
          <TableHead>File</TableHead>
          <TableHead>Imported</TableHead>
        </tr>
      </thead>
      <tbody>
        {versions.map((version) => (
          <TableRow key={version.version}>
            <TableCell className="font-mono text-13">
              {version.version}
              {version.current ? <span className="text-ink-3"> current</span> : null}
            </TableCell>
            <TableCell className="text-right font-mono text-13">{version.faces.toLocaleString('en')}</TableCell>
            <TableCell className="max-w-96 truncate font-mono text-13 text-ink-2" title={version.file ?? undefined}>
              {version.file}
            </TableCell>
            <TableCell className="text-13 text-ink-2">
              <Moment at={version.created_at} /> by {version.created_by}
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}
