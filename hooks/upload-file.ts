import { RequestError } from './request-json';

interface Upload {
  url: string;
  file: File;
  onProgress: (sentBytes: number) => void;
  signal: AbortSignal;
}

/** Beyond this the browser would hold too much at once to hash it before sending. */
const HASH_BELOW_BYTES = 64 * 1024 * 1024;

/** The file's SHA-256 in hex, where the browser can say it: on plain HTTP away from this machine it cannot. */
async function hashOf(file: File): Promise<string | null> {
  if (!globalThis.isSecureContext || file.size > HASH_BELOW_BYTES) return null;
  const digest = await crypto.subtle.digest('SHA-256', await file.arrayBuffer());
  return [...new Uint8Array(digest)].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}

function send({ url, file, onProgress, signal }: Upload, hash: string | null): Promise<void> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const abort = () => request.abort();
    request.open('PUT', url);
    request.setRequestHeader('content-type', 'application/octet-stream');
    if (hash) request.setRequestHeader('x-content-sha256', hash);
    request.upload.onprogress = (event) => onProgress(event.loaded);
    request.onload = () => (request.status >= 200 && request.status < 300 ? resolve() : reject(refusal(request)));
    request.onerror = () => reject(new RequestError(0, 'not_reached', 'The server was not reached.'));
    request.onabort = () => reject(new DOMException('stopped', 'AbortError'));
    request.onloadend = () => signal.removeEventListener('abort', abort);
    signal.addEventListener('abort', abort);
    request.send(file);
  });
}

function refusal(request: XMLHttpRequest): RequestError {
  try {
    const problem = JSON.parse(request.responseText) as { code?: string; detail?: string };
    return new RequestError(request.status, problem.code ?? 'internal', problem.detail ?? 'The server refused this.');
  } catch {
    return new RequestError(request.status, 'internal', 'The server refused this.');
  }
}

/** Sends one file, trying again after passing faults. Errors: RequestError; AbortError when the signal ends it. */
export async function uploadFile(upload: Upload): Promise<void> {
  const hash = await hashOf(upload.file).catch(() => {
    throw new RequestError(0, 'unreadable', 'The browser cannot read this file any more. Was it moved or changed?');
  });
  for (let turn = 1; ; turn++) {
    try {
      return await send(upload, hash);
    } catch (error) {
      const passes = error instanceof RequestError && (error.status === 0 || error.status >= 500);
      if (!passes || turn === 3 || upload.signal.aborted) throw error;
      await new Promise((resolve) => setTimeout(resolve, turn * 1000));
    }
  }
}
