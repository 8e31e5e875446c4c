import Link from 'next/link';
import { AccountMenu } from './account-menu';
import { Mark } from './mark';
import { NavLinks, type NavItem } from './nav-links';

interface TopBarProps {
  show: { code: string; title: string } | null;
  items: readonly NavItem[];
  user: { name: string; email: string };
  accountLinks?: readonly { href: string; label: string }[];
  onSignOut: () => void;
}

/** The bar above every page. On a phone the pages stand in a strip of their own below it. */
export function TopBar({ show, items, user, accountLinks, onSignOut }: TopBarProps) {
  return (
    <header className="border-b border-rule bg-bench">
      <div className="flex h-13 items-stretch">
        <Link href="/shows" className="flex items-center gap-2.5 px-4 md:px-6">
          <Mark />
          <span className={show === null ? 'text-16 font-medium' : 'text-16 font-medium max-md:sr-only'}>
            Weighhouse
          </span>
        </Link>
        {show === null ? null : (
          <p className="flex min-w-0 items-center gap-2.5 border-x border-rule px-4">
            <span className="font-mono text-13 font-medium">{show.code}</span>
            <span className="truncate text-14 text-ink-2 md:max-lg:hidden">{show.title}</span>
          </p>
        )}
        {items.length === 0 ? null : (
          <nav aria-label="Show" className="ml-6 hidden lg:ml-10 md:block">
            <NavLinks items={items} />
          </nav>
        )}
        <div className="ml-auto flex items-center gap-2 pr-3 pl-2 md:pr-5">
          <AccountMenu name={user.name} email={user.email} links={accountLinks} onSignOut={onSignOut} />
        </div>
      </div>
      {items.length === 0 ? null : (
        <nav aria-label="Show" className="h-11 overflow-x-auto border-t border-rule px-4 md:hidden">
          <NavLinks items={items} className="gap-5" />
        </nav>
      )}
    </header>
  );
}
