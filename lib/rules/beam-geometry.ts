/** The beam: a part's extent along its longest box axis with the place where it balances, in a box of 176 × 26 pixels. */
export const BEAM_BOX = { width: 176, height: 26 } as const;
/** Where the line begins, behind the axis letter, and its length for the asset's largest part. */
export const BEAM_START = 20;
export const BEAM_LENGTH = 140;
const SHORTEST = 12;
/** How far beyond an end a broken-off fulcrum stands. */
const BROKEN_OFF = 9;

export type Axis = 'x' | 'y' | 'z';
const AXES: readonly Axis[] = ['x', 'y', 'z'];
type Three = readonly [number, number, number];

export interface BeamInput {
  /** Box in the asset's axes, metres: min xyz, max xyz. */
  bounds: readonly [number, number, number, number, number, number];
  /** Centre of mass in the asset's axes, metres; null while there is none. */
  centre: Three | null;
  mass: number | null;
  /** Diagonal of the inertia matrix about the centre of mass, kg·m². */
  inertia: Three | null;
  /** Longest box edge among the asset's parts, metres. */
  largest: number;
  /** Centre of mass of the approved value. */
  approved?: Three | null;
  /** Centre of mass of the mirror partner as it is; it is mirrored in the plane x = 0 here. */
  partner?: Three | null;
}

/** Pixels along the box, but for the lengths in metres and the shares of the extent. */
export interface BeamGeometry {
  axis: Axis;
  start: number;
  end: number;
  quarters: [number, number];
  /** ± the radius of gyration; none where the centre lies outside. */
  bracket: [number, number] | null;
  /** `outside`: −1 before the start, 1 behind the end, 0 inside. */
  fulcrum: { at: number; outside: -1 | 0 | 1 } | null;
  approvedAt: number | null;
  partnerAt: number | null;
  /** Extent and radius of gyration along the axis, metres. */
  extent: number;
  gyration: number | null;
  /** Place of the centre of mass as a share of the extent from the drawn start. */
  share: number | null;
  approvedShare: number | null;
  partnerShare: number | null;
}

/** Longest edge of a box; of equal ones x before y before z. */
export function longestAxis(bounds: BeamInput['bounds']): { axis: Axis; extent: number } {
  return AXES.map((axis, i) => ({ axis, extent: bounds[i + 3] - bounds[i] })).reduce((best, next) =>
    next.extent > best.extent ? next : best,
  );
}

/** Radius of gyration along an axis: √(∫s² dm / m), where ∫s² dm = (sum of the other two moments − its own) / 2. */
export function gyrationAlong(axis: Axis, inertia: Three, mass: number): number {
  const i = AXES.indexOf(axis);
  const second = (inertia[(i + 1) % 3] + inertia[(i + 2) % 3] - inertia[i]) / 2;
  return Math.sqrt(Math.max(0, second) / mass);
}

/**
 * Draws from low to high along the axis, but a part that lies on the negative side of x and is longest along x from the
 * middle plane outwards: so left and right are drawn the same way round.
 */
export function beamGeometry(input: BeamInput): BeamGeometry {
  const { axis, extent } = longestAxis(input.bounds);
  const i = AXES.indexOf(axis);
  const low = input.bounds[i];
  const high = input.bounds[i + 3];
  const outwardsLeft = axis === 'x' && low + high < 0;
  const relative = input.largest > 0 ? Math.min(1, extent / input.largest) : 1;
  const length = Math.max(SHORTEST, BEAM_LENGTH * relative);

  const shareOf = (at: number) => (extent > 0 ? (outwardsLeft ? high - at : at - low) / extent : 0.5);
  const pixel = (share: number) => BEAM_START + share * length;
  const kept = (share: number) =>
    Math.min(BEAM_START + length + BROKEN_OFF, Math.max(BEAM_START - BROKEN_OFF, pixel(share)));

  const share = input.centre === null ? null : shareOf(input.centre[i]);
  const approvedShare = input.approved == null ? null : shareOf(input.approved[i]);
  const partnerShare = input.partner == null ? null : shareOf(axis === 'x' ? -input.partner[0] : input.partner[i]);
  const gyration =
    input.inertia === null || input.mass === null || !(input.mass > 0)
      ? null
      : gyrationAlong(axis, input.inertia, input.mass);
  const bracket: [number, number] | null =
    share === null || share < 0 || share > 1 || gyration === null || extent <= 0
      ? null
      : [kept(share - gyration / extent), kept(share + gyration / extent)];

  return {
    axis,
    start: BEAM_START,
    end: BEAM_START + length,
    quarters: [pixel(0.25), pixel(0.75)],
    bracket,
    fulcrum: share === null ? null : { at: fulcrumAt(share, length), outside: share < 0 ? -1 : share > 1 ? 1 : 0 },
    approvedAt: approvedShare === null ? null : kept(approvedShare),
    partnerAt: partnerShare === null ? null : kept(partnerShare),
    extent,
    gyration,
    share,
    approvedShare,
    partnerShare,
  };
}

function fulcrumAt(share: number, length: number): number {
  if (share < 0) return BEAM_START - BROKEN_OFF;
  if (share > 1) return BEAM_START + length + BROKEN_OFF;
  return BEAM_START + share * length;
}
