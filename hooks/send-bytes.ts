import { RequestError } from './request-json';

interface Bytes {
  url: string;
  body: Blob;
  /** Lower-case hex. */
  sha256: string;
  onProgress: (sentBytes: number) => void;
  signal: AbortSignal;
}

/** A connection over which nothing has gone for so long is taken to be lost. */
const SILENT_MS = 60_000;

/** Puts bytes under an address with their hash; the one way that tells how far it is. Errors: RequestError; AbortError when the signal ends it. */
export function sendBytes({ url, body, sha256, onProgress, signal }: Bytes): Promise<void> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    let isSilent = false;
    let timer: ReturnType<typeof setTimeout>;
    const listen = () => {
      clearTimeout(timer);
      timer = setTimeout(() => {
        isSilent = true;
        request.abort();
      }, SILENT_MS);
    };
    const abort = () => request.abort();
    const lost = () => reject(new RequestError(0, 'not_reached', 'The server was not reached.'));
    request.open('PUT', url);
    request.setRequestHeader('content-type', 'application/octet-stream');
    request.setRequestHeader('x-content-sha256', sha256);
    request.upload.onprogress = (event) => {
      listen();
      onProgress(event.loaded);
    };
    // Sent whole: the server may take its time with the answer.
    request.upload.onload = () => clearTimeout(timer);
    request.onload = () => (request.status >= 200 && request.status < 300 ? resolve() : reject(refusal(request)));
    request.onerror = lost;
    request.onabort = () => (isSilent ? lost() : reject(new DOMException('stopped', 'AbortError')));
    request.onloadend = () => {
      clearTimeout(timer);
      signal.removeEventListener('abort', abort);
    };
    if (signal.aborted) return reject(new DOMException('stopped', 'AbortError'));
    signal.addEventListener('abort', abort);
    listen();
    request.send(body);
  });
}

function refusal(request: XMLHttpRequest): RequestError {
  try {
    const problem = JSON.parse(request.responseText) as { code?: string; detail?: string; field?: string | null };
    return new RequestError(request.status, problem.code ?? 'internal', problem.detail ?? 'The server refused this.', problem.field ?? null);
  } catch {
    return new RequestError(request.status, 'internal', 'The server refused this.');
  }
}
