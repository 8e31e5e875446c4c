import { open, type FileHandle } from 'node:fs/promises';

const CHUNK_BYTES = 256 * 1024;

/**
 * The first bytes of a file as a stream that reads as fast as it is drained. The file is open when this resolves, so that removing
 * it no longer matters. `onSent` runs after the last byte was taken and before the stream ends, and may read on from there; a
 * reader that leaves early never reaches it. Rejects with ENOENT where there is no such file.
 */
export async function fileStream(path: string, byteSize: number, onSent: (file: FileHandle) => Promise<void> = () => Promise.resolve()): Promise<ReadableStream<Uint8Array>> {
  const handle = await open(path, 'r');
  let left = byteSize;
  return new ReadableStream<Uint8Array>(
    {
      async pull(controller) {
        try {
          if (left > 0) {
            const most = Math.min(CHUNK_BYTES, left);
            const { bytesRead, buffer } = await handle.read(new Uint8Array(most), 0, most, null);
            if (bytesRead === 0) throw new Error(`${left} bytes of ${path} are missing.`);
            left -= bytesRead;
            return controller.enqueue(buffer.subarray(0, bytesRead));
          }
          await onSent(handle);
          await handle.close();
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
