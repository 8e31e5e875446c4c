import { createHash } from 'node:crypto';
import { POST as ANNOUNCE } from '@/app/api/v1/shows/[show]/imports/[import]/uploads/route';
import { POST as COMPLETE } from '@/app/api/v1/shows/[show]/imports/[import]/uploads/[upload]/complete/route';
import { PUT as PUT_PART } from '@/app/api/v1/shows/[show]/imports/[import]/uploads/[upload]/parts/[part]/route';
import { SMALLEST_PART_BYTES, type UploadAnswer } from '@/lib/rules/upload-parts';
import { call, type Answer } from './api';

export const PART = SMALLEST_PART_BYTES;

export const sha256Of = (bytes: Uint8Array | string): string => createHash('sha256').update(bytes).digest('hex');

/** A sender: into which import of which show, and by whose token. */
export interface Sender {
  show: string;
  id: string;
  token: string | null;
}

/** An OBJ of at least so many bytes: a cube, and comments that differ by the seed. */
export function longObj(cube: string, bytes: number, seed: string): Buffer {
  const line = `# ${seed} ${'-'.repeat(60)}\n`;
  return Buffer.from(cube + line.repeat(Math.ceil(Math.max(0, bytes - cube.length) / line.length)));
}

export function announce({ show, id, token }: Sender, name: string, content: Buffer, extra: Record<string, unknown> = {}): Promise<Answer> {
  return call(ANNOUNCE, { method: 'POST', params: { show, import: id }, token, body: { name, bytes: content.length, sha256: sha256Of(content), part_bytes: PART, ...extra } });
}

export const partOf = (content: Buffer, number: number): Buffer => content.subarray((number - 1) * PART, number * PART);

export function putPart({ show, id, token }: Sender, upload: string, number: number, bytes: Buffer, headers: Record<string, string> = { 'x-content-sha256': sha256Of(bytes) }): Promise<Answer> {
  return call(PUT_PART, { method: 'PUT', params: { show, import: id, upload, part: String(number) }, token, raw: new Uint8Array(bytes), headers });
}

export function complete({ show, id, token }: Sender, upload: string, name: string, extra: Record<string, unknown> = {}): Promise<Answer> {
  return call(COMPLETE, { method: 'POST', params: { show, import: id, upload }, token, body: { name, ...extra } });
}

/** The whole way of a file in parts; answers what the end answered. */
export async function sendInParts(sender: Sender, name: string, content: Buffer): Promise<Answer> {
  const announced = (await announce(sender, name, content)).json as unknown as UploadAnswer;
  if (announced.upload === null) throw new Error('Nothing was needed.');
  for (let number = 1; number <= announced.part_count; number++) if (!announced.parts.includes(number)) await putPart(sender, announced.upload, number, partOf(content, number));
  return complete(sender, announced.upload, name);
}
