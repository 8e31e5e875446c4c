import { setTimeout as wait } from 'node:timers/promises';
import { logTail } from './service.mjs';
import { Stop } from './stop.mjs';

/** Waits until the web server says that it and what it stands on are ready. */
export async function waitUntilReady(address, web, limitMs = 300_000) {
  const end = Date.now() + limitMs;
  let last = 'no answer';
  while (Date.now() < end) {
    if (web.ends > 0) throw new Stop(`The web server ended at its start:\n${logTail(web.log)}`);
    try {
      const answer = await fetch(`${address}/api/health/ready`, { signal: AbortSignal.timeout(10_000) });
      last = `${answer.status} ${(await answer.text()).slice(0, 500)}`;
      if (answer.ok) return;
    } catch {
      // It does not listen yet.
    }
    await wait(50);
  }
  throw new Stop(`The web server was not ready after ${limitMs / 1000} s: ${last}\n${logTail(web.log)}`);
}
