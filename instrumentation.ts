/**
 * Runs once when the server starts. Open event streams are closed when it is told to end, or it would wait for their
 * readers. NEXT_RUNTIME is no setting: the build puts it in, so that the other runtime never sees Node's signals.
 */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME === 'nodejs') {
    const { closeStreamsAtEnd } = await import('@/lib/http/close-streams-at-end');
    closeStreamsAtEnd();
  }
}
