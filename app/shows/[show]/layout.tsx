import type { Metadata } from 'next';
import type { ReactNode } from 'react';
import { SignedInShell } from '@/components/users/signed-in-shell';
import { may } from '@/lib/rules/roles';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showNavItems } from '@/lib/shows/show-nav-items';

type Params = { params: Promise<{ show: string }> };

export async function generateMetadata({ params }: Params): Promise<Metadata> {
  const { access } = await getPageShow((await params).show, 'readLocked');
  return { title: { default: access.show.code, template: `%s · ${access.show.code} · Weighhouse` } };
}

export default async function ShowLayout({ children, params }: Params & { children: ReactNode }) {
  const { context, access } = await getPageShow((await params).show, 'readLocked');
  const { actor } = context;
  return (
    <SignedInShell
      user={{ name: actor.name, email: actor.email, isAdmin: actor.isAdmin }}
      show={{ code: access.show.code, title: access.show.title }}
      items={may(access.role, 'readShow') ? showNavItems(access) : []}
    >
      {children}
    </SignedInShell>
  );
}
