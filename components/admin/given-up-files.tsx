'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useTransition } from 'react';
import { toast } from 'sonner';
import { Section } from '@/components/forms/section';
import { Button } from '@/components/ui/button';
import { When } from '@/components/users/when';
import type { ActionResult } from '@/lib/rules/action-result';
import type { TroubledFile } from '@/lib/rules/queue-state';

type Retry = (input: { show: string; import: string; files: string[] }) => Promise<ActionResult<unknown>>;

/** Files that were given up through no fault of their own: why, what was tried, and another try. */
export function GivenUpFiles({ files, retry }: { files: readonly TroubledFile[]; retry: Retry }) {
  const router = useRouter();
  const [busy, start] = useTransition();

  function again(file: TroubledFile) {
    start(async () => {
      const result = await retry({ show: file.show, import: file.import, files: [file.file] });
      if (!result.ok) return void toast.error(result.message);
      toast(`${file.file} is tried again`);
      router.refresh();
    });
  }

  return (
    <Section title="Given up">
      {files.length === 0 ? (
        <p className="text-14 text-ink-2">Nothing. Files that are wrong in themselves stand in the report of their import.</p>
      ) : (
        <ul className="flex flex-col">
          {files.map((file) => (
            <li key={`${file.import} ${file.file}`} className="flex flex-col gap-1 border-b border-rule py-2.5 text-14">
              <div className="flex flex-wrap items-baseline gap-x-3 gap-y-1">
                <Link className="link min-w-0 font-mono text-13 break-all" href={`/shows/${encodeURIComponent(file.show)}/imports/${file.import}`}>
                  {file.file}
                </Link>
                <span className="text-13 text-ink-3">{file.show}</span>
                <When at={file.at} className="ml-auto text-13 text-ink-3" />
                <Button size="small" disabled={busy} onClick={() => again(file)} aria-label={`Try ${file.file} again`}>
                  Try again
                </Button>
              </div>
              <p className="text-ink-2">{file.reason}</p>
              {file.faults.length === 0 ? null : (
                <details>
                  <summary className="w-fit text-13 text-ink-2 hover:text-ink">What was tried</summary>
                  <ol className="mt-1 flex flex-col gap-0.5 text-13 text-ink-2">
                    {file.faults.map((fault) => (
                      <li key={`${fault.attempt} ${fault.at}`}>
                        {fault.attempt}. <When at={fault.at} />
                        {fault.worker === null ? '' : `, ${fault.worker}`}: {fault.message}
                      </li>
                    ))}
                  </ol>
                </details>
              )}
            </li>
          ))}
        </ul>
      )}
    </Section>
  );
}
