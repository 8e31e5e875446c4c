import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Cage } from '@/lib/engine/cage';

/** Header whose absence says that Debian's package libosd-dev is not installed. */
const HEADER = '/usr/include/opensubdiv/far/patchTableFactory.h';

/** Relative error of the volume that the isolation is chosen for. */
export const CPP_TOLERANCE = 1e-9;

export interface CppResult {
  isolation: number;
  cpuMs: number;
  volume: number;
  /** 0 where it was not asked for. */
  area: number;
  peakMb: number;
}

/**
 * Patch quadrature in C++ (tests/bench/cpp), compiled on the spot. Null where the library or a compiler is not installed.
 * `close` removes what was made.
 */
export function cppWay(): { measure(cage: Cage, volume: number, withAreas: boolean): CppResult; close(): void } | null {
  if (!existsSync(HEADER)) return null;
  const folder = mkdtempSync(join(tmpdir(), 'patch-quadrature-'));
  const program = join(folder, 'patch-quadrature');
  const source = fileURLToPath(new URL('./cpp/patch-quadrature.cpp', import.meta.url));
  const close = (): void => rmSync(folder, { recursive: true, force: true });
  const compiled = spawnSync('g++', ['-O3', '-march=native', '-std=c++17', source, '-o', program, '-losdCPU'], { encoding: 'utf8' });
  if (compiled.error !== undefined) {
    close();
    return null;
  }
  if (compiled.status !== 0) throw new Error(`the comparison program does not compile: ${compiled.stderr}`);
  return {
    close,
    measure(cage, volume, withAreas) {
      const path = join(folder, 'cage.bin');
      const faces = cage.faceStarts.length - 1;
      const sizes = Int32Array.from({ length: faces }, (_, face) => cage.faceStarts[face + 1] - cage.faceStarts[face]);
      const bytes = (values: ArrayBufferView): Buffer => Buffer.from(values.buffer, values.byteOffset, values.byteLength);
      writeFileSync(path, Buffer.concat([
        bytes(Int32Array.of(cage.positions.length / 3, faces, cage.faceVertices.length)), bytes(cage.positions), bytes(sizes), bytes(Int32Array.from(cage.faceVertices)),
      ]));
      const { status, stdout, stderr } = spawnSync(program, [path, String(volume), String(CPP_TOLERANCE), withAreas ? 'areas' : 'solids'], { encoding: 'utf8' });
      if (status !== 0) throw new Error(`the comparison program failed: ${stderr}`);
      const [isolation, cpuMs, found, peakKb, area] = stdout.trim().split(' ').map(Number);
      return { isolation, cpuMs, volume: found, area, peakMb: peakKb / 1024 };
    },
  };
}
