const holder = globalThis as typeof globalThis & { weighhouseStreams?: Set<() => void> };

function streams(): Set<() => void> {
  holder.weighhouseStreams ??= new Set();
  return holder.weighhouseStreams;
}

/** Names a long answer, such as server-sent events, that has to be closed before the server can end. Call the answer when it closes by itself. */
export function registerStream(close: () => void): () => void {
  streams().add(close);
  return () => void streams().delete(close);
}

/** Closes every open long answer: the server waits for them otherwise. */
export function closeOpenStreams(): void {
  for (const close of streams()) close();
  streams().clear();
}
