const holder = globalThis as typeof globalThis & { weighhouseOpenStreams?: Set<() => void> };

function streams(): Set<() => void> {
  return (holder.weighhouseOpenStreams ??= new Set());
}

/** Remembers how to end a stream that would keep the server from stopping; answers how to forget it. */
export function registerStream(close: () => void): () => void {
  streams().add(close);
  return () => streams().delete(close);
}

/** Ends every open stream of this process: called when the server is told to stop. */
export function closeOpenStreams(): void {
  for (const close of [...streams()]) close();
}
