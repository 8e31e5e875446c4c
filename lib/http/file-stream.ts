import { open } from 'node:fs/promises';

const CHUNK_BYTES = 256 * 1024;

/**
 * A file as a stream that reads as fast as it is drained. The file is open when this resolves, so that removing it no longer
 * matters. `onSent` runs after the last byte was taken and before the stream ends; a reader that leaves early never reaches it.
 * Rejects with ENOENT where there is no such file.
 */
export async function fileStream(path: string, onSent: () => Promise<void>): Promise<ReadableStream<Uint8Array>> {
  const handle = await open(path, 'r');
  return new ReadableStream<Uint8Array>(
    {
      async pull(controller) {
        try {
          const { bytesRead, buffer } = await handle.read(new Uint8Array(CHUNK_BYTES), 0, CHUNK_BYTES, null);
          if (bytesRead > 0) return controller.enqueue(buffer.subarray(0, bytesRead));
          await handle.close();
          await onSent();
          controller.close();
        } catch (error) {
          await handle.close().catch(() => undefined);
          throw error;
        }
      },
      cancel: () => handle.close(),
    },
    { highWaterMark: 0 },
  );
}
