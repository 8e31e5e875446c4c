import type { ReactNode } from 'react';
import { Section } from '@/components/forms/section';
import { formatBytes } from '@/lib/rules/format-bytes';
import { When } from './when';

interface StudioFactsProps {
  queue: { waiting: number; running: number; failed: number; oldest_waiting_s: number | null } | null;
  disk: { free_bytes: number; total_bytes: number } | null;
  kept: { database_bytes: number; file_bytes: number; files: number };
  mail: { waiting: number; failed: number; local: number; server: boolean };
  failures: { kind: 'file' | 'job'; subject: string; reason: string; show: string | null; at: string }[];
}

/** How the studio's machine is doing, and what failed lately. */
export function StudioFacts({ queue, disk, kept, mail, failures }: StudioFactsProps) {
  return (
    <div className="grid gap-x-14 gap-y-10 px-4 py-6 md:px-6 xl:grid-cols-[minmax(0,26rem)_minmax(0,1fr)]">
      <div className="flex flex-col gap-8">
        <Section title="Queue">
          {queue === null ? (
            <p className="text-14 text-wrong">The queue cannot be read. Is the worker running?</p>
          ) : (
            <Facts>
              <Fact name="Waiting">{queue.waiting.toLocaleString('en')}</Fact>
              <Fact name="Running">{queue.running.toLocaleString('en')}</Fact>
              <Fact name="Oldest that waits, s">
                {queue.oldest_waiting_s === null ? '–' : queue.oldest_waiting_s.toLocaleString('en')}
              </Fact>
              <Fact name="Given up">{queue.failed.toLocaleString('en')}</Fact>
            </Facts>
          )}
        </Section>
        <Section title="Disk">
          <Facts>
            <Fact name="Free">
              {disk === null ? 'cannot be read' : `${formatBytes(disk.free_bytes)} of ${formatBytes(disk.total_bytes)}`}
            </Fact>
            <Fact name="Cages kept">{`${formatBytes(kept.file_bytes)} in ${kept.files.toLocaleString('en')} ${kept.files === 1 ? 'file' : 'files'}`}</Fact>
            <Fact name="Database">{formatBytes(kept.database_bytes)}</Fact>
          </Facts>
        </Section>
        <Section title="Mail">
          <Facts>
            <Fact name="Mail server">{mail.server ? 'set' : 'none, messages stay in the mailbox'}</Fact>
            <Fact name="Waiting">{mail.waiting.toLocaleString('en')}</Fact>
            <Fact name="Not sent">{mail.failed.toLocaleString('en')}</Fact>
          </Facts>
        </Section>
      </div>
      <Section title="What failed lately">
        {failures.length === 0 ? (
          <p className="text-14 text-ink-2">Nothing.</p>
        ) : (
          <ul className="flex flex-col">
            {failures.map((failure, index) => (
              <li key={`${index} ${failure.at}`} className="border-b border-rule py-2.5 text-14">
                <p className="flex flex-wrap items-baseline gap-x-3">
                  <span className="min-w-0 font-mono text-13 break-all">{failure.subject}</span>
                  <span className="text-13 text-ink-3">{failure.show === null ? 'job' : failure.show}</span>
                  <When at={failure.at} className="ml-auto text-13 text-ink-3" />
                </p>
                <p className="text-ink-2">{failure.reason}</p>
              </li>
            ))}
          </ul>
        )}
      </Section>
    </div>
  );
}

function Facts({ children }: { children: ReactNode }) {
  return <dl className="flex flex-col">{children}</dl>;
}

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <div className="flex min-h-8 items-center justify-between gap-4 border-b border-rule">
      <dt className="text-14 text-ink-2">{name}</dt>
      <dd className="text-right text-14">{children}</dd>
    </div>
  );
}
