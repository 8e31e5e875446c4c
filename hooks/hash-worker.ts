import { hashParts, type FileHashes } from './hash-parts';

export interface HashOrder {
  id: number;
  file: Blob;
  partBytes: number;
}

export type HashNews = { id: number; hashedBytes: number } | { id: number; hashes: FileHashes } | { id: number; fault: string };

const say = (news: HashNews) => self.postMessage(news);

/** The worker that hashes files, so that the page stays quick meanwhile. One order at a time. */
let last: Promise<void> = Promise.resolve();
self.addEventListener('message', ({ data }: MessageEvent<HashOrder>) => {
  const { id, file, partBytes } = data;
  last = last.then(async () => {
    try {
      say({ id, hashes: await hashParts(file, partBytes, (hashedBytes) => say({ id, hashedBytes })) });
    } catch (error) {
      say({ id, fault: error instanceof Error ? error.name : 'Error' });
    }
  });
});
