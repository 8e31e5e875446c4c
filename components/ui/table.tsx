import type { ComponentProps } from 'react';
import { cn } from './cn';

/** A plain table of a page; the parts table has its own virtual rows in the same dress. */
export function Table({ className, ...props }: ComponentProps<'table'>) {
  return (
    // Words for the ear alone stand free of the flow: without a box of their own to stand in they would widen the page.
    <div className="relative overflow-x-auto" tabIndex={0}>
      <table className={cn('w-full border-collapse text-14', className)} {...props} />
    </div>
  );
}

export function TableHead({ className, ...props }: ComponentProps<'th'>) {
  return (
    <th
      scope="col"
      className={cn(
        'h-9 border-b border-rule px-2.5 text-left text-12 font-normal whitespace-nowrap text-ink-3',
        className,
      )}
      {...props}
    />
  );
}

export function TableRow({ className, ...props }: ComponentProps<'tr'>) {
  return <tr className={cn('h-8 border-b border-rule', className)} {...props} />;
}

export function TableCell({ className, ...props }: ComponentProps<'td'>) {
  return <td className={cn('px-2.5 whitespace-nowrap', className)} {...props} />;
}
