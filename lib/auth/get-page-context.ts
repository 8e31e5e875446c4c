import { randomUUID } from 'node:crypto';
import { headers } from 'next/headers';
import { notFound, redirect } from 'next/navigation';
import { cache } from 'react';
import { database } from '@/db/client';
import type { ActorContext, Context } from '@/lib/context';
import { PATH_HEADER } from '@/lib/rules/path-header';
import { safePath } from '@/lib/rules/safe-path';
import { findSessionActor } from './find-actor';

/** The context of the page being rendered; nobody may be signed in. Found once a request. */
export const getOpenPageContext = cache(async (): Promise<Context> => {
  const actor = await findSessionActor(database(), await headers());
  return { db: database(), actor, origin: 'hand', requestId: randomUUID() };
});

/** The context of a page for signed-in people; leads everybody else to the sign-in page and, from there, back to this address. */
export async function getPageContext(): Promise<ActorContext> {
  const context = await getOpenPageContext();
  if (context.actor) return { ...context, actor: context.actor };
  const back = safePath((await headers()).get(PATH_HEADER));
  redirect(`/sign-in?callbackUrl=${encodeURIComponent(back)}`);
}

/** The context of a page for admins; to everybody else it is an address where nothing is. */
export async function getAdminPageContext(): Promise<ActorContext> {
  const context = await getPageContext();
  if (!context.actor.isAdmin) notFound();
  return context;
}
