import type { ReactNode } from 'react';

/** Title of a page, what it is measured by (such as the progress rule), and its acts. */
export function PageHeading({
  title,
  measure,
  actions,
}: {
  title: ReactNode;
  measure?: ReactNode;
  actions?: ReactNode;
}) {
  return (
    <div className="flex flex-wrap items-center gap-x-9 gap-y-3 border-b border-rule px-4 py-4 md:px-6">
      <h1>{title}</h1>
      {measure === undefined ? null : (
        <div className="order-last w-full min-w-0 lg:order-none lg:w-auto lg:max-w-160 lg:flex-1">{measure}</div>
      )}
      {actions === undefined ? null : <div className="ml-auto flex flex-wrap items-center gap-2">{actions}</div>}
    </div>
  );
}
