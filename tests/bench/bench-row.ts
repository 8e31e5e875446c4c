import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { Worker } from 'node:worker_threads';
import type { Cage, Scheme } from '@/lib/engine/cage';
import { setPatchTeam } from '@/lib/engine/kernel/patch-block';
import { dismissTeam, helpTeam, teamKernels, teamMemory } from '@/lib/engine/kernel/patch-team';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredCage, MeasureOptions } from '@/lib/engine/measured';
import { readObj } from '@/lib/formats/obj';
import { objBytes, torus, type Cut } from './bench-cages';
import { plainVolume } from './plain-way';

/** What a row's own process is asked. */
export interface RowTask {
  scheme: Scheme;
  /** Path of an OBJ file, or the quads each way of a torus and how they are cut. */
  cage: { file: string } | { quads: number; cut: Cut };
  /** From a parsed cage to values on one core or on two, from the file's bytes to values, or the plain way with so many refinements. */
  way: 'cage' | 'team' | 'file' | { refinements: number };
}

/** What it answers: the best of some rounds after the compiler has warmed up. */
export interface RowAnswer {
  faces: number;
  /** Wall clock, and processor time of the whole process, in which other work on the machine counts less. */
  wallMs: number;
  cpuMs: number;
  rounds: number;
  volume: number;
  area: number | null;
  ownEstimate: number | null;
  /** Bytes a face that the process took at its peak beyond what it had before the cage was made. */
  bytesPerFace: number;
  peakMb: number;
  hash: string;
}

/** Quads each way of the torus that warms the compiler up, and for how long. */
const WARM_QUADS = 60;
const WARM_MS = 600;

/** A row goes on until it has run so long and so often. */
const LEAST_MS = 1_000;
const LEAST_ROUNDS = 3;
const MOST_ROUNDS = 200;

export function optionsOf(scheme: Scheme): MeasureOptions {
  return { scheme, boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'whole' };
}

export function makeCage(cage: RowTask['cage']): Cage {
  return 'file' in cage ? readObj(readFileSync(cage.file)) : torus(cage.quads, cage.cut);
}

function hashOf(values: readonly number[]): string {
  return createHash('sha256').update(Buffer.from(Float64Array.from(values).buffer)).digest('hex').slice(0, 12);
}

/** Runs a row's work in this process. */
export async function runRow({ scheme, cage: spec, way }: RowTask): Promise<RowAnswer> {
  const options = optionsOf(scheme);
  warmUp(workOn('file' in spec ? makeCage(spec) : torus(WARM_QUADS, spec.cut), options, way));
  const bytesBefore = process.memoryUsage.rss();
  const { faces, work } = countedWork(makeCage(spec), options, way);
  const close = way === 'team' ? await startTeam() : undefined;
  let wallMs = Infinity;
  let cpuMs = Infinity;
  let rounds = 0;
  let result = work();
  for (const start = performance.now(); rounds < MOST_ROUNDS && (rounds < LEAST_ROUNDS || performance.now() - start < LEAST_MS); rounds++) {
    const cpuBefore = process.cpuUsage();
    const begin = performance.now();
    result = work();
    wallMs = Math.min(wallMs, performance.now() - begin);
    const { user, system } = process.cpuUsage(cpuBefore);
    cpuMs = Math.min(cpuMs, (user + system) / 1000);
  }
  await close?.();
  const peak = 1024 * process.resourceUsage().maxRSS;
  return {
    faces, wallMs, cpuMs, rounds, volume: result.volume, area: result.area, ownEstimate: result.estimate, bytesPerFace: (peak - bytesBefore) / faces, peakMb: peak / 2 ** 20, hash: result.hash,
  };
}

interface Outcome {
  volume: number;
  area: number | null;
  estimate: number | null;
  hash: string;
}

/** What a way does with a cage; from a file on, the cage itself is not kept. */
function workOn(cage: Cage, options: MeasureOptions, way: RowTask['way']): () => Outcome {
  if (typeof way === 'object') {
    return () => {
      const volume = plainVolume(cage, options, way.refinements);
      return { volume, area: null, estimate: null, hash: hashOf([volume]) };
    };
  }
  if (way !== 'file') return () => summary(measureCage(cage, options));
  return workOnFile(objBytes(cage), options);
}

function workOnFile(bytes: Uint8Array, options: MeasureOptions): () => Outcome {
  return () => summary(measureCage(readObj(bytes), options));
}

function countedWork(cage: Cage, options: MeasureOptions, way: RowTask['way']): { faces: number; work: () => Outcome } {
  return { faces: cage.faceStarts.length - 1, work: workOn(cage, options, way) };
}

/** The first rounds pay for the compiler: what is shown is what a thread that has measured before reaches. */
function warmUp(work: () => Outcome): void {
  for (const start = performance.now(); performance.now() - start < WARM_MS; ) work();
}

function summary(measured: MeasuredCage): Outcome {
  const components = measured.parts.flatMap((part) => part.components);
  const volume = components.reduce((sum, c) => sum + c.solid.volume, 0);
  const hash = hashOf(components.flatMap((c) => [c.solid.volume, ...c.solid.centroid, ...c.solid.centralSecond]));
  const area = components.reduce((sum, c) => sum + c.surface.area, 0);
  return { volume, area, estimate: Math.max(...components.map((c) => c.errorEstimate)), hash };
}

/** One helper beside this thread; answers how to send it home. */
async function startTeam(): Promise<() => Promise<void>> {
  const memory = teamMemory();
  const worker = new Worker(new URL(import.meta.url), { workerData: memory });
  await new Promise((resolve, reject) => worker.once('message', resolve).once('error', reject));
  setPatchTeam(teamKernels(memory));
  return async () => {
    setPatchTeam(null);
    dismissTeam(memory);
    await worker.terminate();
  };
}

/** In the helper's thread: helps until it is dismissed. */
export function help(memory: SharedArrayBuffer, ready: () => void): void {
  ready();
  helpTeam(memory);
}
