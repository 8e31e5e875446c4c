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

/** The same, gathered by the folders right below, in the order of their names; a folder's files are held in memory together, by key. */
export async function* listByFolder(folder: string): AsyncIterable<{ name: string; files: Map<string, StoredFile> }> {
  if (config().s3) return yield* gathered(listStored(folder), folder);
  const names = [...(await (await disk()).listAll(`${folder}/`)).objects].map((one) => (one.isDirectory ? one.prefix : one.key).slice(folder.length + 1)).sort();
  for (const name of names) {
    const files = new Map<string, StoredFile>();
    for await (const file of listStored(`${folder}/${name}`)) files.set(file.key, file);
    yield { name, files };
  }
}

/** A bucket lists its keys in order, so that a folder's come together. */
async function* gathered(all: AsyncIterable<StoredFile>, folder: string): AsyncIterable<{ name: string; files: Map<string, StoredFile> }> {
  let name: string | null = null;
  let files = new Map<string, StoredFile>();
  for await (const file of all) {
    const [next] = file.key.slice(folder.length + 1).split('/');
    if (name !== null && name !== next) {
      yield { name, files };
      files = new Map();
    }
    name = next;
    files.set(file.key, file);
  }
  if (name !== null) yield { name, files };
}
