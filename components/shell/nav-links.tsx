'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { cn } from '@/components/ui/cn';

export interface NavItem {
  href: string;
  label: string;
  /** How many wait there. */
  count?: number;
  /** Something there is wrong. */
  wrong?: boolean;
  /** Another address whose pages belong to this item. */
  covers?: string;
}

/** The item whose address the page stands under; the longest one wins. */
export function currentItem(items: readonly NavItem[], pathname: string): NavItem | null {
  const isUnder = (href: string) => pathname === href || pathname.startsWith(`${href}/`);
  const covering = items.find((item) => item.covers !== undefined && isUnder(item.covers));
  if (covering) return covering;
  const under = items.filter((item) => isUnder(item.href));
  return under.reduce<NavItem | null>(
    (best, item) => (best === null || item.href.length > best.href.length ? item : best),
    null,
  );
}

export function NavLinks({ items, className }: { items: readonly NavItem[]; className?: string }) {
  const current = currentItem(items, usePathname());
  return (
    <ul className={cn('flex h-full items-stretch gap-7', className)}>
      {items.map((item) => (
        <li key={item.href} className="flex">
          <Link
            href={item.href}
            aria-current={item === current ? 'page' : undefined}
            className={cn(
              'flex items-center gap-1.5 border-y-2 border-transparent text-14 whitespace-nowrap',
              item === current ? 'border-b-brass text-ink' : 'text-ink-2 hover:text-ink',
            )}
          >
            {item.label}
            {item.count === undefined || item.count === 0 ? null : (
              <span className={cn('text-13', item.wrong ? 'font-medium text-wrong' : 'text-ink-3')}>
                {item.count.toLocaleString('en')}
              </span>
            )}
          </Link>
        </li>
      ))}
    </ul>
  );
}
