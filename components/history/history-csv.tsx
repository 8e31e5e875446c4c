import { Button } from '@/components/ui/button';

/** The whole of a filtered history as a file. */
export function HistoryCsv({ href }: { href: string }) {
  return (
    <Button asChild>
      <a href={href} download>
        Download CSV
      </a>
    </Button>
  );
}
