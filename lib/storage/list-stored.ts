import { config } from '@/lib/config';
import { disk } from './disk';

export interface StoredFile {
  key: string;
  byteSize: number;
  modified: Date;
}

/** Every file under a folder of the storage, page by page. What vanishes while it is listed is left out. */
export async function* listStored(folder: string): AsyncIterable<StoredFile> {
  if (config().s3) return yield* (await import('./list-bucket')).listBucket(folder);
  for (const object of (await (await disk()).listAll(`${folder}/`, { recursive: true })).objects) {
    if (!object.isFile) continue;
    const about = await object.getMetaData().catch(() => null);
    if (about) yield { key: object.key, byteSize: about.contentLength, modified: about.lastModified };
  }
}
