import { sql } from 'drizzle-orm';
import { database } from '@/db/client';
import { blobs } from '@/db/schema/blobs';
import { countAgainst } from './count-against';
import { blobKey, disk } from './disk';
import { receiveBytes, type ByteSource, type ReceiveOptions } from './receive-bytes';
import { sizeInStorage } from './size-in-storage';
import { asStudioError } from './storage-fault';

export interface StoredBlob {
  sha256: string;
  byteSize: number;
}

export interface StoreOptions extends ReceiveOptions {
  /** The bytes were counted for the studio when their upload was announced. */
  isReserved?: boolean;
}

/**
 * Streams bytes into storage under their own hash and writes them down as a blob; bytes that are there already are not stored again. The
 * row comes before the name: from then on no sweep takes the bytes, for the grace time that they have to be referred to. Uses a connection
 * of its own, so call it outside a transaction that has touched blobs. Errors: too_large, bad_input, bad_request, storage_full, not_available.
 */
export async function storeBlob(source: ByteSource, options: StoreOptions): Promise<StoredBlob> {
  const received = await receiveBytes(source, options);
  try {
    const { sha256, byteSize } = received;
    await noteBlob({ sha256, byteSize }, options.isReserved ?? false);
    const key = blobKey(sha256);
    const size = await sizeInStorage(key);
    // Another size than its bytes have is no file of ours but the rest of a fault, and is mended by the right one.
    if (size !== null && size !== byteSize) await (await disk()).delete(key);
    if (size !== byteSize) await received.place(key);
    return { sha256, byteSize };
  } catch (error) {
    throw asStudioError(error);
  } finally {
    await received.discard().catch(() => undefined);
  }
}

/** A sweep that is removing the blob holds its row, so this waits for it and then writes a new one. */
async function noteBlob(blob: StoredBlob, isReserved: boolean): Promise<void> {
  await database().transaction(async (tx) => {
    const known = await tx
      .insert(blobs)
      .values(blob)
      .onConflictDoUpdate({ target: blobs.sha256, set: { seenAt: sql`case when ${blobs.seenAt} < now() - interval '1 hour' then now() else ${blobs.seenAt} end` } })
      .returning({ isNew: sql<boolean>`xmax = 0` });
    if (known[0].isNew && !isReserved) await countAgainst(tx, { kind: 'studio' }, blob.byteSize, true);
  });
}
