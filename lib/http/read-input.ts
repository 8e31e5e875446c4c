import { StudioError } from '@/lib/rules/studio-error';

const MAX_JSON_BYTES = 16 * 1024 * 1024;

/**
 * One plain object out of a request: query first, then the JSON body's fields, then the path's parameters, so that a body can
 * never redirect a request to another show. Throws bad_request for malformed JSON, too_large past 16 MiB.
 */
export async function readInput(
  request: Request,
  params: Record<string, string | string[]>,
  rawBody: boolean,
): Promise<Record<string, unknown>> {
  const query = Object.fromEntries(new URL(request.url).searchParams);
  const hasBody = !rawBody && request.method !== 'GET' && request.method !== 'HEAD';
  return { ...query, ...(hasBody ? await readJson(request) : {}), ...params };
}

async function readJson(request: Request): Promise<Record<string, unknown>> {
  const text = await readText(request);
  if (text.trim() === '') return {};
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/([a-z.+-]*\+)?json\b/i.test(type)) {
    throw new StudioError('wrong_media_type', 'Send JSON with the content type application/json.');
  }
  const value = parseJson(text);
  if (value === null || typeof value !== 'object' || Array.isArray(value)) {
    throw new StudioError('bad_request', 'The body has to be a JSON object.');
  }
  return value as Record<string, unknown>;
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new StudioError('bad_request', `The body is not JSON: ${error instanceof Error ? error.message : 'unreadable'}.`);
  }
}

async function readText(request: Request): Promise<string> {
  if (!request.body) return '';
  const chunks: Uint8Array[] = [];
  let size = 0;
  const reader = request.body.getReader();
  for (let next = await reader.read(); !next.done; next = await reader.read()) {
    size += next.value.byteLength;
    if (size > MAX_JSON_BYTES) {
      await reader.cancel();
      throw new StudioError('too_large', 'The body is larger than 16 MiB. Send fewer items at once.');
    }
    chunks.push(next.value);
  }
  return Buffer.concat(chunks).toString('utf8');
}
