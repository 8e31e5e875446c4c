import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises';
import { createServer, request, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import S3rver from 's3rver';
import type { Config } from '@/lib/config';

export interface TestS3 {
  config: NonNullable<Config['s3']>;
  /** Requests so far, as `METHOD /path?query`. */
  asked: string[];
  /** Answers a request in place of the storage, when it answers something: a status code, or a dropped connection. */
  fault: (asked: string) => number | 'drop' | null;
  /** Multipart uploads that were begun and neither completed nor aborted. */
  openMultiparts: () => Promise<{ key: string; uploadId: string }[]>;
  /** What the list says of when they were begun. */
  initiated: Date;
  close: () => Promise<void>;
}

const BUCKET = 'weighhouse';
const KEYS = { accessKeyId: 'S3RVER', secretAccessKey: 'S3RVER' };

/** A bucket on loopback. A server in front of it counts requests, makes faults, and lists and aborts multipart uploads, which the fake cannot. */
export async function startS3(): Promise<TestS3> {
  const directory = await mkdtemp(path.join(os.tmpdir(), 'weighhouse-s3-'));
  const fake = new S3rver({ port: 0, address: '127.0.0.1', silent: true, directory, configureBuckets: [{ name: BUCKET, configs: [] }] });
  const { port } = await fake.run();
  const begun = path.join(directory, BUCKET, '._S3rver_uploads');
  const openMultiparts = async () => {
    const ids = await readdir(begun).catch(() => []);
    return Promise.all(ids.map(async (uploadId) => ({ uploadId, key: await readFile(path.join(begun, uploadId, 'key'), 'utf8') })));
  };
  const list = async (answer: ServerResponse) => {
    const uploads = (await openMultiparts()).map(({ key, uploadId }) => `<Upload><Key>${key}</Key><UploadId>${uploadId}</UploadId><Initiated>${s3.initiated.toISOString()}</Initiated></Upload>`);
    answer.writeHead(200, { 'content-type': 'application/xml' });
    answer.end(`<?xml version="1.0"?><ListMultipartUploadsResult><Bucket>${BUCKET}</Bucket><IsTruncated>false</IsTruncated>${uploads.join('')}</ListMultipartUploadsResult>`);
  };
  const pass = (incoming: IncomingMessage, answer: ServerResponse) => {
    const outgoing = request({ host: '127.0.0.1', port, method: incoming.method, path: incoming.url, headers: incoming.headers }, (given) => {
      answer.writeHead(given.statusCode ?? 500, given.headers);
      given.pipe(answer);
    });
    outgoing.on('error', () => answer.destroy());
    incoming.pipe(outgoing);
  };
  const front = createServer((incoming, answer) => {
    const asked = `${incoming.method} ${incoming.url}`;
    s3.asked.push(asked);
    const fault = s3.fault(asked);
    const uploadId = new URL(incoming.url ?? '/', 'http://s3.example').searchParams.get('uploadId');
    if (fault === 'drop') incoming.socket.destroy();
    else if (fault !== null) answer.writeHead(fault).end();
    else if (incoming.method === 'DELETE' && uploadId) void rm(path.join(begun, path.basename(uploadId)), { recursive: true, force: true }).then(() => answer.writeHead(204).end());
    else if (incoming.method === 'GET' && /[?&]uploads(=|&|$)/.test(incoming.url ?? '')) void list(answer);
    else pass(incoming, answer);
  });
  await new Promise<void>((resolve) => front.listen(0, '127.0.0.1', resolve));
  const s3: TestS3 = {
    config: { bucket: BUCKET, endpoint: `http://127.0.0.1:${(front.address() as AddressInfo).port}`, region: 'us-east-1', keys: KEYS, pathStyle: true },
    asked: [],
    fault: () => null,
    openMultiparts,
    initiated: new Date(),
    close: async () => {
      front.closeAllConnections();
      await new Promise((resolve) => front.close(resolve));
      await fake.close();
      await rm(directory, { recursive: true, force: true });
    },
  };
  return s3;
}
