import type { ReactNode } from 'react';
import { SignedInShell } from '@/components/users/signed-in-shell';
import { getPageContext } from '@/lib/auth/get-page-context';

const ADMIN_ITEMS = [
  { href: '/shows', label: 'Shows' },
  { href: '/admin/users', label: 'People' },
  { href: '/admin/mail', label: 'Mailbox' },
  { href: '/admin/queue', label: 'Queue' },
  { href: '/admin', label: 'Studio' },
];

export default async function StudioLayout({ children }: { children: ReactNode }) {
  const { actor } = await getPageContext();
  return (
    <SignedInShell user={{ name: actor.name, email: actor.email, isAdmin: actor.isAdmin }} show={null} items={actor.isAdmin ? ADMIN_ITEMS : []}>
      {children}
    </SignedInShell>
  );
}
