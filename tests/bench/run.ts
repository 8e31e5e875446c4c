import { createHash } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions } from '@/lib/engine/measured';
import { readObj } from '@/lib/formats/obj';
import { quadTorus, triangleTorus } from './bench-cages';
import { cppWay } from './cpp-way';
import { plainVolume } from './plain-way';

/** Size series of the engine beside the plain way. `--quick` leaves out the million; results also go to bench-results/ as JSON. `intake` measures an import instead, `horns` what smoothing removes. */

const OPTIONS: MeasureOptions = { scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'whole' };

interface Row {
  cage: string;
  way: string;
  faces: number;
  /** Processor time of this process, so that other work on the machine counts less. */
  cpuMs: number;
  wallMs: number;
  facesPerSecond: number;
  /** |V − V exact| / |V| against the engine's own value. */
  volumeError: number;
  ownEstimate: number | null;
  residentMb: number;
  hash: string;
}

function timed<T>(work: () => T): { result: T; cpuMs: number; wallMs: number } {
  const cpu = process.cpuUsage();
  const start = performance.now();
  const result = work();
  const used = process.cpuUsage(cpu);
  return { result, cpuMs: (used.user + used.system) / 1000, wallMs: performance.now() - start };
}

function hashOf(values: readonly number[]): string {
  return createHash('sha256').update(Buffer.from(Float64Array.from(values).buffer)).digest('hex').slice(0, 12);
}

function measureRow(name: string, cage: Cage): { row: Row; volume: number } {
  const faces = cage.faceStarts.length - 1;
  const { result, cpuMs, wallMs } = timed(() => measureCage(cage, OPTIONS));
  const components = result.parts.flatMap((part) => part.components);
  const volume = components.reduce((sum, c) => sum + c.solid.volume, 0);
  const estimate = Math.max(...components.map((c) => c.errorEstimate));
  const hash = hashOf(components.flatMap((c) => [c.solid.volume, ...c.solid.centroid, ...c.solid.centralSecond]));
  return { volume, row: { cage: name, way: 'exact', faces, cpuMs, wallMs, facesPerSecond: (1000 * faces) / cpuMs, volumeError: 0, ownEstimate: estimate, residentMb: process.memoryUsage.rss() / 2 ** 20, hash } };
}

function plainRow(name: string, cage: Cage, refinements: number, exact: number): Row {
  const faces = cage.faceStarts.length - 1;
  const { result, cpuMs, wallMs } = timed(() => plainVolume(cage, OPTIONS, refinements));
  return {
    cage: name, way: `refine ${refinements}×, tetrahedra`, faces, cpuMs, wallMs, facesPerSecond: (1000 * faces) / cpuMs,
    volumeError: Math.abs(result / exact - 1), ownEstimate: null, residentMb: process.memoryUsage.rss() / 2 ** 20, hash: hashOf([result]),
  };
}

if (process.argv.includes('intake')) {
  const { printIntake } = await import('./intake');
  await printIntake();
  process.exit(0);
}

if (process.argv.includes('horns')) {
  const { benchHorns } = await import('./horns');
  console.table(benchHorns());
  process.exit(0);
}

const spot = readObj(readFileSync(new URL('../reference/cages/spot.obj', import.meta.url)));
const series: [string, Cage, number][] = [
  ['spot', spot, 5],
  ['quads 1 k', quadTorus(32, 32), 4],
  ['quads 10 k', quadTorus(100, 100), 2],
  ['quads 100 k', quadTorus(320, 320), 1],
  ['triangles 2 k', triangleTorus(32, 32), 3],
  ['triangles 20 k', triangleTorus(100, 100), 1],
];
if (!process.argv.includes('--quick')) series.push(['quads 1 M', quadTorus(1000, 1000), 0]);

// The first runs pay for the compiler; what is shown is what a worker reaches.
for (let i = 0; i < 5; i++) measureCage(spot, OPTIONS);
for (let i = 0; i < 3; i++) measureCage(series[2][1], OPTIONS);

const CPP_WAY = 'C++ patches to 1e-9';

/** The C++ row of a cage. It computes solid moments alone: no area, diagnosis or cage; `wallMs` is its processor time too. */
function cppRow(name: string, cage: Cage, exact: number): Row {
  const faces = cage.faceStarts.length - 1;
  if (cpp === null) return { cage: name, way: `${CPP_WAY}: not installed`, faces, cpuMs: NaN, wallMs: NaN, facesPerSecond: NaN, volumeError: NaN, ownEstimate: null, residentMb: NaN, hash: '' };
  const { isolation, cpuMs, volume, peakMb } = cpp.measure(cage, exact);
  return {
    cage: name, way: `${CPP_WAY}, isolation ${isolation}`, faces, cpuMs, wallMs: cpuMs, facesPerSecond: (1000 * faces) / cpuMs,
    volumeError: Math.abs(volume / exact - 1), ownEstimate: null, residentMb: peakMb, hash: hashOf([volume]),
  };
}

const cpp = cppWay();
const rows: Row[] = [];
for (const [name, cage, refinements] of series) {
  const { row, volume } = measureRow(name, cage);
  rows.push(row);
  if (refinements > 0) rows.push(plainRow(name, cage, refinements, volume));
  rows.push(cppRow(name, cage, volume));
}
cpp?.close();
console.table(rows.map((row) => ({
  cage: row.cage, way: row.way, faces: row.faces, 'cpu ms': Math.round(row.cpuMs), 'wall ms': Math.round(row.wallMs), 'faces/s': Math.round(row.facesPerSecond),
  'volume error': row.volumeError.toExponential(1), 'own estimate': row.ownEstimate?.toExponential(1) ?? '', 'memory MB': Math.round(row.residentMb), hash: row.hash,
})));
mkdirSync('bench-results', { recursive: true });
writeFileSync('bench-results/engine.json', `${JSON.stringify({ node: process.version, rows }, null, 1)}\n`);
