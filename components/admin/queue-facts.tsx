import Link from 'next/link';
import { Section } from '@/components/forms/section';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { When } from '@/components/users/when';
import { formatBytes } from '@/lib/rules/format-bytes';
import type { QueueState, TroubledFile, WaitingShow, WorkerState } from '@/lib/rules/queue-state';

/** What waits, who works on what since when, and what is put off after a fault. */
export function QueueFacts({ waiting_files: waiting, oldest_waiting_s: oldest, workers, shows, put_off: putOff }: QueueState) {
  return (
    <>
      <Section title="Waiting">
        {shows.length === 0 ? (
          <p className="text-14 text-ink-2">Nothing waits.</p>
        ) : (
          <>
            <p className="text-14 text-ink-2">
              {waiting.toLocaleString('en')} {waiting === 1 ? 'file' : 'files'}
              {oldest === null ? '' : `, the first of them for ${spanWords(oldest)}`}. Shows take turns.
            </p>
            <WaitingTable shows={shows} />
          </>
        )}
      </Section>
      <Section title="Workers">
        {workers.some((worker) => worker.alive) ? null : <p className="text-14 text-wrong">No worker is running. Start one: files wait until then.</p>}
        {workers.length === 0 ? null : <WorkerTable workers={workers} />}
      </Section>
      {putOff.length === 0 ? null : (
        <Section title="Put off after a fault">
          <PutOffTable files={putOff} />
        </Section>
      )}
    </>
  );
}

/** Seconds as somebody would say them: `90 s`, `12 min`, `5 h`. */
function spanWords(seconds: number): string {
  if (seconds < 120) return `${seconds} s`;
  return seconds < 7200 ? `${Math.round(seconds / 60)} min` : `${Math.round(seconds / 3600).toLocaleString('en')} h`;
}

function WaitingTable({ shows }: { shows: readonly WaitingShow[] }) {
  return (
    <Table aria-label="Files that wait">
      <thead>
        <tr>
          <TableHead>Show</TableHead>
          <TableHead className="text-right">Files</TableHead>
          <TableHead className="text-right">Paused</TableHead>
          <TableHead>Since</TableHead>
        </tr>
      </thead>
      <tbody>
        {shows.map((show) => (
          <TableRow key={show.show}>
            <TableCell>
              <Link className="link" href={`/shows/${encodeURIComponent(show.show)}/imports`}>
                {show.show}
              </Link>
            </TableCell>
            <TableCell className="text-right">{show.files.toLocaleString('en')}</TableCell>
            <TableCell className="text-right">{show.paused_files.toLocaleString('en')}</TableCell>
            <TableCell>
              <When at={show.since} />
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}

function WorkerTable({ workers }: { workers: readonly WorkerState[] }) {
  return (
    <Table aria-label="Workers">
      <thead>
        <tr>
          <TableHead>Worker</TableHead>
          <TableHead className="text-right">Threads</TableHead>
          <TableHead className="text-right">Memory</TableHead>
          <TableHead>Running since</TableHead>
          <TableHead>In hand</TableHead>
        </tr>
      </thead>
      <tbody>
        {workers.map((worker, index) => (
          <TableRow key={`${index} ${worker.name}`}>
            <TableCell>
              {worker.name}
              {worker.alive ? '' : ' (silent)'}
            </TableCell>
            <TableCell className="text-right">{worker.threads}</TableCell>
            <TableCell className="text-right">{formatBytes(worker.memory_bytes)}</TableCell>
            <TableCell>
              <When at={worker.started_at} />
            </TableCell>
            <TableCell>
              {worker.files.length === 0 ? (
                <span className="text-ink-3">nothing</span>
              ) : (
                <ul>
                  {worker.files.map((file) => (
                    <li key={`${file.import} ${file.file}`}>
                      <Link className="link font-mono text-13" href={importHref(file)}>
                        {file.file}
                      </Link>{' '}
                      <span className="text-13 text-ink-3">
                        {file.show}
                        {file.since === null ? null : (
                          <>
                            {' '}
                            since <When at={file.since} />
                          </>
                        )}
                        {file.attempt > 1 ? `, try ${file.attempt}` : ''}
                      </span>
                    </li>
                  ))}
                </ul>
              )}
            </TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}

const importHref = (file: { show: string; import: string }): string => `/shows/${encodeURIComponent(file.show)}/imports/${file.import}`;

function PutOffTable({ files }: { files: readonly TroubledFile[] }) {
  return (
    <Table aria-label="Files put off after a fault">
      <thead>
        <tr>
          <TableHead>File</TableHead>
          <TableHead>Show</TableHead>
          <TableHead>What happened</TableHead>
          <TableHead>Tried again</TableHead>
        </tr>
      </thead>
      <tbody>
        {files.map((file) => (
          <TableRow key={`${file.import} ${file.file}`}>
            <TableCell>
              <Link className="link font-mono text-13" href={importHref(file)}>
                {file.file}
              </Link>
            </TableCell>
            <TableCell>{file.show}</TableCell>
            <TableCell>{file.reason}</TableCell>
            <TableCell>{file.again_at === null ? '' : <When at={file.again_at} />}</TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}
