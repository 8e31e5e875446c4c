import { disk } from './disk';
import { isMissingInStorage } from './storage-fault';

/** How many bytes lie under a key; null where nothing does. */
export async function sizeInStorage(key: string): Promise<number | null> {
  try {
    return (await (await disk()).getMetaData(key)).contentLength;
  } catch (error) {
    if (isMissingInStorage(error)) return null;
    throw error;
  }
}
