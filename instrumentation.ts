import { closeOpenStreams } from '@/lib/imports/open-streams';

/** Runs once when the server starts: open event streams are closed when it is told to end, or it would wait for their readers. */
export function register(): void {
  if (typeof process.once !== 'function') return;
  process.once('SIGTERM', closeOpenStreams);
  process.once('SIGINT', closeOpenStreams);
}
