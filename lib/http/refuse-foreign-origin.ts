import { StudioError } from '@/lib/rules/studio-error';

/** Refuses a write that a browser sends from somebody else's page (cross-site request forgery). Browsers always say where from. */
export function refuseForeignOrigin(request: Request): void {
  const site = request.headers.get('sec-fetch-site');
  const origin = request.headers.get('origin');
  const host = request.headers.get('host');
  const foreign = (site !== null && site !== 'same-origin' && site !== 'none') || (origin !== null && hostOf(origin) !== host);
  if (foreign) throw new StudioError('forbidden', 'This request comes from another site.');
}

function hostOf(origin: string): string | null {
  return URL.canParse(origin) ? new URL(origin).host : null;
}
