'use client';

import { Notice } from '@/components/shell/notice';
import { Button } from '@/components/ui/button';

export default function ErrorPage({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <Notice title="This page broke" action={<Button onClick={reset}>Try again</Button>}>
      Nothing was changed by it.
      {error.digest === undefined ? null : (
        <>
          {' '}
          Reference <code className="font-mono text-13 text-ink">{error.digest}</code>.
        </>
      )}
    </Notice>
  );
}
