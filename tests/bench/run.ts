import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { cpus, loadavg } from 'node:os';
import { join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';
import type { Scheme } from '@/lib/engine/cage';
import { makeCage, type RowAnswer, type RowTask } from './bench-row';
import { cppWay } from './cpp-way';

/**
 * Size series of the engine per scheme, from a parsed cage and from a file's bytes to values, beside the plain way and patch quadrature in C++. Also written
 * to bench-results/engine.json. `--quick` leaves out what takes long; `intake` measures imports instead (`--large`: a gigabyte too; `--files=200`, `--only=small`), `horns` what smoothing removes.
 */
interface Row {
  scheme: Scheme;
  cage: string;
  way: string;
  faces: number;
  /** The best of `rounds`: processor time of the row's process, and wall clock. */
  cpuMs: number;
  wallMs: number;
  rounds: number;
  /** By processor time; with two threads by the wall clock. */
  facesPerSecond: number;
  /** |V − V exact| / |V| against the engine's own value, and the same of the area where there is one. */
  volumeError: number;
  areaError: number | null;
  ownEstimate: number | null;
  bytesPerFace: number;
  peakMb: number;
  hash: string;
}

interface Series {
  scheme: Scheme;
  name: string;
  cage: RowTask['cage'];
  /** Refinements of the plain way; 0: left out. */
  plain: number;
  ways: readonly ('cage' | 'team' | 'file')[];
}

if (process.argv.includes('intake')) {
  const { printIntake } = await import('./intake');
  const valueOf = (option: string): string | undefined => process.argv.find((arg) => arg.startsWith(`${option}=`))?.slice(option.length + 1);
  await printIntake({ files: Number(valueOf('--files') ?? 2_000), large: process.argv.includes('--large'), only: valueOf('--only') ?? null });
  process.exit(0);
}

if (process.argv.includes('horns')) {
  const { benchHorns } = await import('./horns');
  console.table(benchHorns());
  process.exit(0);
}

const quick = process.argv.includes('--quick');
const WAYS = { cage: 'cage to values', team: 'cage to values, two threads', file: 'file to values' };
const CPP_WAY = 'C++ patches to 1e-9';
const CPP_AREA_WAY = 'C++ patches to 1e-9, with areas';

/** Quads each way and the plain way's refinements. */
const SIZES: [label: string, quads: number, plain: number][] = quick ? [['1 k', 32, 4], ['100 k', 320, 1]] : [['1 k', 32, 4], ['10 k', 100, 2], ['100 k', 320, 1], ['1 M', 1000, 0]];

function seriesOf(scheme: Scheme): Series[] {
  const series: Series[] = [];
  for (const [label, quads, plain] of SIZES) {
    // Two triangles a quad: a little fewer quads for the same number of faces.
    const triangles = 2 * Math.round(quads / Math.SQRT2 / 2);
    const ways: Series['ways'] = label === '1 k' || label === '10 k' ? ['cage', 'file'] : ['cage', 'team', 'file'];
    series.push({ scheme, name: `regular ${label}`, cage: scheme === 'loop' ? { quads: triangles, cut: 'all' } : { quads, cut: 'none' }, plain, ways });
    if (label === '1 M') continue;
    if (scheme === 'catmull-clark' && label === '100 k') series.push({ scheme, name: `one quad in 1000 cut, ${label}`, cage: { quads, cut: 'few' }, plain, ways: ['cage', 'file'] });
    if (scheme === 'catmull-clark') series.push({ scheme, name: `one quad in 100 cut, ${label}`, cage: { quads, cut: 'some' }, plain, ways: ['cage', 'file'] });
    if (!quick || label === '1 k') series.push({ scheme, name: `irregular ${label}`, cage: { quads: triangles, cut: scheme === 'loop' ? 'alternating' : 'all' }, plain, ways: ['cage'] });
  }
  return series;
}

const spot: Series = {
  scheme: 'catmull-clark', name: 'spot', cage: { file: fileURLToPath(new URL('../reference/cages/spot.obj', import.meta.url)) }, plain: 5, ways: ['cage', 'file'],
};
const schemes: Scheme[] = ['catmull-clark', 'loop', 'doo-sabin'];
// Within the checkout, where the bundle finds the packages.
mkdirSync('bench-results', { recursive: true });
const folder = mkdtempSync(resolve('bench-results', 'rows-'));
const rows: Row[] = [];
const cpp = cppWay();
try {
  const program = join(folder, 'row.mjs');
  await build({
    entryPoints: [fileURLToPath(new URL('row-process.ts', import.meta.url))], outfile: program, bundle: true, platform: 'node', target: 'node20', format: 'esm',
    tsconfig: fileURLToPath(new URL('../../tsconfig.json', import.meta.url)), packages: 'external', logLevel: 'error',
  });
  const ask = (task: RowTask): RowAnswer => {
    const { status, stdout, stderr } = spawnSync(process.execPath, ['--max-old-space-size=16384', program, JSON.stringify(task)], { encoding: 'utf8' });
    if (status !== 0) throw new Error(`a row failed: ${stderr}`);
    return JSON.parse(stdout) as RowAnswer;
  };
  for (const series of [spot, ...schemes.flatMap(seriesOf)]) {
    const { scheme, name, cage, plain, ways } = series;
    const put = (way: string, answer: RowAnswer): void => {
      const { volume, area, ...rest } = answer;
      const row: Row = { scheme, cage: name, way, ...rest, facesPerSecond: (1000 * answer.faces) / (way === WAYS.team ? answer.wallMs : answer.cpuMs), volumeError: Math.abs(volume / exact - 1), areaError: area === null ? null : Math.abs(area / exactArea - 1) };
      rows.push(row);
      console.log(lineOf(row));
    };
    let exact = NaN;
    let exactArea = NaN;
    for (const way of ways) {
      const answer = ask({ scheme, cage, way });
      if (Number.isNaN(exact)) [exact, exactArea] = [answer.volume, answer.area ?? NaN];
      put(WAYS[way], answer);
    }
    if (plain > 0) put(`refine ${plain}×, tetrahedra`, ask({ scheme, cage, way: { refinements: plain } }));
    if (scheme !== 'catmull-clark' || name.endsWith('1 M')) continue;
    const none = { scheme, cage: name, faces: rows[rows.length - 1].faces, cpuMs: NaN, wallMs: NaN, rounds: 0, facesPerSecond: NaN, volumeError: NaN, areaError: null, ownEstimate: null, bytesPerFace: NaN, peakMb: NaN, hash: '' };
    // It computes solid moments alone, or ten of the surface beside them: no borders, no diagnosis, no moments of the cage, no estimate.
    for (const withAreas of [false, true]) {
      const way = withAreas ? CPP_AREA_WAY : CPP_WAY;
      if (cpp === null) rows.push({ ...none, way: `${way}: not installed` });
      else {
        const { isolation, cpuMs, volume, area, peakMb } = cpp.measure(makeCage(cage), exact, withAreas);
        rows.push({
          ...none, way: `${way}, isolation ${isolation}`, cpuMs, wallMs: cpuMs, facesPerSecond: (1000 * none.faces) / cpuMs, volumeError: Math.abs(volume / exact - 1),
          areaError: withAreas ? Math.abs(area / exactArea - 1) : null, bytesPerFace: (peakMb * 2 ** 20) / none.faces, peakMb,
        });
      }
      console.log(lineOf(rows[rows.length - 1]));
    }
  }
} finally {
  cpp?.close();
  rmSync(folder, { recursive: true, force: true });
}

function lineOf(row: Row): string {
  return `${row.scheme}  ${row.cage}  ${row.way}  ${row.cpuMs.toFixed(1)} ms`;
}

console.table(rows.map((row) => ({
  scheme: row.scheme, cage: row.cage, way: row.way, faces: row.faces, 'cpu ms': Number(row.cpuMs.toPrecision(4)), 'wall ms': Number(row.wallMs.toPrecision(4)), 'faces/s': Math.round(row.facesPerSecond),
  'volume error': row.volumeError.toExponential(1), 'area error': row.areaError?.toExponential(1) ?? '', 'own estimate': row.ownEstimate?.toExponential(1) ?? '', 'peak MB': Math.round(row.peakMb),
  'peak B/face': Math.round(row.bytesPerFace), hash: row.hash,
})));
console.log(`node ${process.version}, ${cpus()[0].model}, ${cpus().length} cores, load ${loadavg()[0].toFixed(1)}`);
writeFileSync('bench-results/engine.json', `${JSON.stringify({ node: process.version, processor: cpus()[0].model, cores: cpus().length, load: loadavg(), rows }, null, 1)}\n`);
