/**
 * The rings 0 to 3 around the centre of a fan of n faces (quads or triangles), all other vertices regular. In the grid of sector j the spoke j runs along a,
 * spoke j + 1 along b: point (a, 0) lies on spoke j, (0, b) on spoke j + 1, (0, 0) is the centre.
 */
export interface FanState {
  sectors: number;
  closed: boolean;
  /** Closed fans: spoke 0 is infinitely sharp. Open fans: their two end spokes always are. */
  sharpFirst: boolean;
  centreRule: number;
  centre: Float64Array;
  /** Points 1 … 3 of each spoke: [(3 spoke + a − 1) · 3 + axis]; n spokes, one more where the fan is open. */
  spokes: Float64Array;
  /** Points (a, b), 1 … 3 each (triangles have those with a + b ≤ 3 only): [(9 sector + 3 (a − 1) + b − 1) · 3 + axis]. */
  inner: Float64Array;
}

/** A fan of so many sectors whose points are still zero. */
export function makeFanState(sectors: number, closed: boolean, sharpFirst: boolean, centreRule: number): FanState {
  return {
    sectors, closed, sharpFirst, centreRule,
    centre: new Float64Array(3),
    spokes: new Float64Array(9 * (closed ? sectors : sectors + 1)),
    inner: new Float64Array(27 * sectors),
  };
}

/** Whether a spoke is infinitely sharp. */
export function isSharpSpoke(fan: FanState, spoke: number): boolean {
  return fan.closed ? fan.sharpFirst && spoke === 0 : spoke === 0 || spoke === fan.sectors;
}

/** Offset of the spoke before (0) or after (1) a sector. */
export function spokeAt(fan: FanState, sector: number, side: number): number {
  const spoke = sector + side;
  return 9 * (fan.closed && spoke === fan.sectors ? 0 : spoke);
}

/** Takes `shift` off all points of the rings 0 to 2. */
export function translateFan(fan: FanState, shift: Float64Array): void {
  for (const values of [fan.centre, fan.spokes, fan.inner]) for (let i = 0; i < values.length; i++) values[i] -= shift[i % 3];
}

/** Rings shrink by at least 0.66 a step: 90 steps reach rounding. */
const LIMIT_STEPS = 90;

/** The centre's limit point by refining until nothing moves, for kinds without a mask. */
export function iterateLimit(fan: FanState, refine: (from: FanState, to: FanState) => void): Float64Array {
  let state = fan;
  let finer = makeFanState(fan.sectors, fan.closed, fan.sharpFirst, fan.centreRule);
  let spare = makeFanState(fan.sectors, fan.closed, fan.sharpFirst, fan.centreRule);
  for (let step = 0; step < LIMIT_STEPS; step++) {
    refine(state, finer);
    [state, finer, spare] = [finer, spare, step === 0 ? makeFanState(fan.sectors, fan.closed, fan.sharpFirst, fan.centreRule) : state];
  }
  return Float64Array.from(state.centre);
}

/** Point (a, b) of a sector, 0 ≤ a, b ≤ 3, into `net` at `at`. */
export function putSectorPoint(fan: FanState, sector: number, a: number, b: number, net: Float64Array, at: number): void {
  let source = fan.inner;
  let from = 27 * sector + 9 * (a - 1) + 3 * (b - 1);
  if (a === 0 && b === 0) {
    source = fan.centre;
    from = 0;
  } else if (b === 0) {
    source = fan.spokes;
    from = spokeAt(fan, sector, 0) + 3 * (a - 1);
  } else if (a === 0) {
    source = fan.spokes;
    from = spokeAt(fan, sector, 1) + 3 * (b - 1);
  }
  net[at] = source[from];
  net[at + 1] = source[from + 1];
  net[at + 2] = source[from + 2];
}
