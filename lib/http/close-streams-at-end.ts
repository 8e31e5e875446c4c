import { closeOpenStreams } from '@/lib/imports/open-streams';

/** Closes open event streams when the process is told to end. */
export function closeStreamsAtEnd(): void {
  process.once('SIGTERM', closeOpenStreams);
  process.once('SIGINT', closeOpenStreams);
}
