'use client';

import { Notice } from '@/components/shell/notice';
import { Button } from '@/components/ui/button';
import './globals.css';

/** Stands in for the whole document when the layout itself fails, so it brings its own. */
export default function GlobalError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <html lang="en" data-theme="dark">
      <body>
        <Notice title="Weighhouse broke" action={<Button onClick={reset}>Try again</Button>}>
          Nothing was changed by it.
          {error.digest === undefined ? null : (
            <>
              {' '}
              Reference <code className="font-mono text-13 text-ink">{error.digest}</code>.
            </>
          )}
        </Notice>
      </body>
    </html>
  );
}
