import { NextResponse, type NextRequest } from 'next/server';
import { sessionCookie } from '@/lib/auth/session-cookie';
import { config as settings } from '@/lib/config';
import { contentPolicy } from '@/lib/http/content-policy';
import { PATH_HEADER } from '@/lib/rules/path-header';

const OPEN_PAGES = /^\/(sign-in|first-run|invite|reset)(\/|$)/;

/** Leads whoever carries no session to the sign-in page and gives every page its policy. Whether a session is good is asked by the page. */
export function proxy(request: NextRequest): NextResponse {
  const { pathname, search } = request.nextUrl;
  const isRead = request.method === 'GET' || request.method === 'HEAD';
  if (isRead && !OPEN_PAGES.test(pathname) && !request.cookies.has(sessionCookie().name)) {
    const target = request.nextUrl.clone();
    target.pathname = '/sign-in';
    target.search = `?callbackUrl=${encodeURIComponent(pathname + search)}`;
    return NextResponse.redirect(target);
  }
  const policy = contentPolicy(crypto.randomUUID().replaceAll('-', ''), settings().isProduction);
  const headers = new Headers(request.headers);
  headers.set('content-security-policy', policy);
  headers.set(PATH_HEADER, pathname + search);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set('content-security-policy', policy);
  response.headers.set('referrer-policy', 'same-origin');
  response.headers.set('x-content-type-options', 'nosniff');
  return response;
}

export const config = {
  // A proxy over an upload would cut its body at 10 MiB without an error, so `api` stays out.
  matcher: ['/((?!api/|_next/static/|_next/image|icon\\.svg|favicon\\.ico).*)'],
};
