'use client';

import { signOut } from 'next-auth/react';
import type { ReactNode } from 'react';
import { AppShell } from '@/components/shell/app-shell';
import type { NavItem } from '@/components/shell/nav-links';

interface SignedInShellProps {
  user: { name: string; email: string; isAdmin: boolean };
  show: { code: string; title: string } | null;
  items: readonly NavItem[];
  children: ReactNode;
}

/** Bar and page of somebody who is signed in. */
export function SignedInShell({ user, show, items, children }: SignedInShellProps) {
  const accountLinks = [
    { href: '/shows', label: 'Shows' },
    { href: '/account', label: 'Account' },
    { href: '/docs/conventions', label: 'Conventions' },
    ...(user.isAdmin ? [{ href: '/admin', label: 'Studio' }] : []),
  ];
  return (
    <AppShell
      show={show}
      items={items}
      user={user}
      accountLinks={accountLinks}
      onSignOut={() => void signOut({ callbackUrl: '/sign-in' })}
    >
      {children}
    </AppShell>
  );
}
