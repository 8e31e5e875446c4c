import { Readable } from 'node:stream';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import measureFile, { type MeasureTask } from '@/lib/jobs/engine-thread';
import { openBlob } from '@/lib/storage/open-blob';
import { cubeObj } from '../support/cages';

vi.mock('@/lib/storage/open-blob', () => ({ openBlob: vi.fn() }));

const stored = vi.mocked(openBlob);
beforeEach(() => {
  stored.mockReset();
});

const TASK: MeasureTask = {
  name: 'cube.obj', sha256: '0'.repeat(64), options: { scheme: 'polyhedral', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'whole' },
  space: { metresPerUnit: 1, upAxis: 'y', other: 'refuse' }, idleThreads: 0, port: null,
};

async function* inPieces(text: string, size: number): AsyncGenerator<Buffer> {
  for (let at = 0; at < text.length; at += size) yield Buffer.from(text.slice(at, at + size));
}

describe('measuring a stored file', () => {
  it('reads it as it comes', async () => {
    stored.mockResolvedValue(Readable.from(inPieces(cubeObj({ size: 2 }), 5)));
    const outcome = await measureFile(TASK);
    expect(outcome.ok && outcome.cage.parts[0].components[0].solid.volume).toBeCloseTo(8, 12);
  });

  it('answers the file’s own faults, and stops reading there', async () => {
    const stream = Readable.from(inPieces(`v 0 0 0\nv 1 nan 0\n${'v 1 2 3\n'.repeat(100_000)}`, 100));
    stored.mockResolvedValue(stream);
    expect(await measureFile(TASK)).toMatchObject({ ok: false, code: 'not_finite', line: 2, column: 5 });
    expect(stream.destroyed).toBe(true);
  });

  it('passes on what the storage has to answer for, so that it is tried again and no number comes of it', async () => {
    const text = cubeObj({ size: 2 });
    const broken = async function* (): AsyncGenerator<Buffer> {
      yield Buffer.from(text);
      throw new Error('The stored bytes have another SHA-256.');
    };
    stored.mockResolvedValue(Readable.from(broken()));
    await expect(measureFile(TASK)).rejects.toThrow('SHA-256');
  });

  it('passes on that the storage is not reached', async () => {
    const fault = Object.assign(new Error('no answer'), { code: 'ECONNREFUSED' });
    stored.mockRejectedValue(fault);
    expect(await measureFile(TASK).catch((error: unknown) => error)).toBe(fault);
  });
});
