import { AREA_TOLERANCE, coarseOf, NODE_RANGES } from '../kernel/node-choice';
import { PatchBlock, separateKernel } from '../kernel/patch-block';
import type { PatchKind } from '../kernel/patch-kinds';
import { applyRows } from '../schemes/sparse-rows';
import { splitMatrix } from './split-net';

const MOST_QUARTERINGS = 10;
/** Share of a patch's difference that its quarters must take off it for more quartering to be worth while; a spoilt rule gains nothing. */
const LEAST_GAIN = 0.3;
/** Quarterings that need no gain: a sharp bend shows none before patches of its own size. */
const PATIENCE = 5;
/** Times by which a quarter's relative difference must fall below that of the whole for the power of 3/2 to hold: where the normal vanishes it does not fall, however small the quarter. */
const ANALYTIC_FALL = 16;

interface Mender {
  block: PatchBlock;
  /** Nets of four quarters, by depth. */
  nets: Float64Array[];
}

const menders = new Map<PatchKind, Mender>();
const solid = new Float64Array(10);

/**
 * Mends the ten surface moments about (ox, oy, oz) of a patch with the net `net` [3 point + axis], whose area by the finest rule for areas and the one it is compared with is `surface[0]` and
 * `coarseArea` and may err by `error` (see `areaError`): the integrand holds a root, so the patch is quartered until that is within `tolerance` (an area).
 * Returns the estimated error of the area.
 */
export function mendSurface(
  kind: PatchKind, net: Float64Array, ox: number, oy: number, oz: number, surface: Float64Array, coarseArea: number, error: number,
  tolerance = AREA_TOLERANCE * surface[0],
): number {
  const area = surface[0];
  if (!(error > tolerance)) return error;
  surface.fill(0);
  return quarter(kind, menderOf(kind), net, 0, [ox, oy, oz], { change: Math.abs(area - coarseArea), area }, tolerance, 1, surface);
}

/** Puts the ten surface moments of a patch by the finest rule for areas into `surface`, mended to `tolerance` (an area) if need be; returns the estimated error of the area. */
export function measureSurface(kind: PatchKind, net: Float64Array, ox: number, oy: number, oz: number, surface: Float64Array, tolerance?: number): number {
  const { block } = menderOf(kind);
  block.put(0, net, ox, oy, oz);
  runForArea(block, kind, 1);
  block.read(0, solid, surface);
  return mendSurface(kind, net, ox, oy, oz, surface, block.coarseArea(0), block.areaError(0), tolerance);
}

function runForArea(block: PatchBlock, kind: PatchKind, patches: number): void {
  const { forArea } = NODE_RANGES[kind];
  block.run(patches, forArea, coarseOf(kind, forArea));
}

function menderOf(kind: PatchKind): Mender {
  let mender = menders.get(kind);
  if (mender === undefined) {
    mender = { block: new PatchBlock(separateKernel(kind)), nets: [] };
    menders.set(kind, mender);
  }
  return mender;
}

/** A patch's area and by how much two rules differ on it. */
interface Compared {
  change: number;
  area: number;
}

/** Adds the moments of the quarters of the patch with the net at `source[from]`, quartered again where they err too much; returns their estimated error. */
function quarter(
  kind: PatchKind, mender: Mender, source: Float64Array, from: number, origin: readonly [number, number, number], before: Compared, tolerance: number, depth: number,
  surface: Float64Array,
): number {
  const { block } = mender;
  const values = block.values;
  const nets = (mender.nets[depth] ??= new Float64Array(4 * values));
  applyRows(splitMatrix(kind), source, from, nets, 0);
  for (let i = 0; i < 4; i++) block.put(i, nets, origin[0], origin[1], origin[2], i * values);
  runForArea(block, kind, 4);
  const moments = new Float64Array(40);
  const changes = [0, 0, 0, 0];
  const areas = [0, 0, 0, 0];
  const errors = [0, 0, 0, 0];
  for (let i = 0; i < 4; i++) {
    const own = moments.subarray(10 * i, 10 * i + 10);
    block.read(i, solid, own);
    areas[i] = own[0];
    changes[i] = Math.abs(own[0] - block.coarseArea(i));
    const analytic = ANALYTIC_FALL * changes[i] * before.area <= before.change * own[0];
    errors[i] = analytic ? block.areaError(i) : changes[i];
  }
  const goOn = depth < PATIENCE || (depth < MOST_QUARTERINGS && changes[0] + changes[1] + changes[2] + changes[3] < (1 - LEAST_GAIN) * before.change);
  let error = 0;
  for (let i = 0; i < 4; i++) {
    if (goOn && errors[i] > tolerance) {
      error += quarter(kind, mender, nets, i * values, origin, { change: changes[i], area: areas[i] }, tolerance, depth + 1, surface);
      continue;
    }
    // What is given up unresolved does not converge geometrically: there the whole difference counts.
    error += errors[i] > tolerance ? changes[i] : errors[i];
    for (let k = 0; k < 10; k++) surface[k] += moments[10 * i + k];
  }
  return error;
}
