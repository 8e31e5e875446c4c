import { checkMassFrame } from './inertia/check-mass-frame';
import { inertiaOfSecondMoments, shiftInertia } from './inertia/inertia-matrix';
import { FREE_AXES_GAP, principalAxes, type FreeAxes } from './inertia/principal-axes';
import type { ShellLimits, Six, SolidMoments, SurfaceMoments, Three } from './measured';
import { wallMoments, type HollowComponent } from './shell/wall-moments';

export const CONSTRUCTIONS = ['solid', 'hollow', 'sheet'] as const;
export type Construction = (typeof CONSTRUCTIONS)[number];

/** What a mass needs of a measured component; a MeasuredComponent fits, and so does a stored geometry record. */
export interface MassComponent {
  solid: SolidMoments;
  surface: SurfaceMoments;
  hollow: Float64Array | null;
  hollowLimits: ShellLimits | null;
  errorEstimate: number;
  surfaceErrorEstimate: number;
}

/** What a body's mass properties follow from: geometry in file units, the rest in SI. */
export interface MassInput {
  components: readonly MassComponent[];
  metresPerUnit: number;
  /** Uniform scale of the asset; acts on the geometry only. */
  scale: number;
  construction: Construction;
  densityKgPerM3?: number | null;
  /** Wins over density and areal density, which then follow from it. */
  targetMassKg?: number | null;
  arealDensityKgPerM2?: number | null;
  wallM?: number | null;
}

/** Mass properties in SI: centre of mass in the asset's axes and from its origin, inertia about the centre of mass in the same axes. */
export interface MassProperties {
  ok: true;
  massKg: number;
  /** Volume of material: of the enclosed set for solids, of the wall for hollow parts, null for sheets. */
  volumeM3: number | null;
  areaM2: number;
  densityKgPerM3: number | null;
  arealDensityKgPerM2: number | null;
  comM: Three;
  /** Matrix entries ixx, iyy, izz, ixy, ixz, iyz about the centre of mass, in the asset's axes; ixy = −∫ρxy. */
  inertiaKgM2: Six;
  principalKgM2: Three;
  quatWxyz: [number, number, number, number];
  freeAxes: FreeAxes;
  /** Of the integration alone, max |Δ| / (|V|·L^k); coordinates taken as exact. */
  numericError: number;
  /** Where the wall of a hollow part is thicker than its surface's local radius and so counts some space twice; null where it is not. */
  tightBend: TightBend | null;
}

/** The smallest local radius of a surface that bends inwards, and where: m, the asset's axes. */
export interface TightBend {
  radiusM: number;
  positionM: Three;
}

export type MassFailureCode = 'no_mass' | 'no_geometry' | 'bad_input' | 'inside_out' | 'no_wall' | 'wall_too_thick' | 'wall_not_measured' | 'check_failed';

/** Why there are no mass properties: a stable code and a sentence that says what to do. */
export interface MassFailure {
  ok: false;
  code: MassFailureCode;
  message: string;
}

/** A failure with its code and its sentence. */
export function massFailure(code: MassFailureCode, message: string): MassFailure {
  return { ok: false, code, message };
}

/** Measure (volume or area), centroid and central second moments of several pieces together, in file units. */
interface Gathered {
  measure: number;
  centroid: Three;
  second: Six;
  error: number;
}

interface Piece {
  measure: number;
  centroid: Three;
  centralSecond: Six;
  error: number;
}

function gather(pieces: readonly Piece[]): Gathered {
  const measure = pieces.reduce((sum, piece) => sum + piece.measure, 0);
  const weight = (axis: number): number => {
    // About the first centroid, so that a part far from the origin loses no digits.
    const from = pieces[0].centroid[axis];
    return from + pieces.reduce((sum, piece) => sum + piece.measure * (piece.centroid[axis] - from), 0) / measure;
  };
  const centroid: Three = [weight(0), weight(1), weight(2)];
  const second: Six = [0, 0, 0, 0, 0, 0];
  for (const piece of pieces) {
    const d: Three = [piece.centroid[0] - centroid[0], piece.centroid[1] - centroid[1], piece.centroid[2] - centroid[2]];
    const outer = [d[0] * d[0], d[1] * d[1], d[2] * d[2], d[0] * d[1], d[0] * d[2], d[1] * d[2]];
    for (let i = 0; i < 6; i++) second[i] += piece.centralSecond[i] + piece.measure * outer[i];
  }
  const error = pieces.reduce((sum, piece) => sum + Math.abs(piece.measure) * piece.error, 0) / Math.abs(measure);
  return { measure, centroid, second, error };
}

function given(value: number | null | undefined): value is number {
  return value !== null && value !== undefined;
}

/**
 * Mass properties of a part from its geometry, setting and scale; the one function that server, browser and command line use.
 * Lengths come in file units and go out in metres: L = metresPerUnit · scale, mass ∝ L³ (sheets L²) at fixed density, inertia ∝ mass · L².
 */
export function massProperties(input: MassInput): MassProperties | MassFailure {
  const { components, construction } = input;
  if (components.length === 0) return massFailure('no_geometry', 'The part has no measured geometry.');
  if (!(input.metresPerUnit > 0) || !(input.scale > 0) || !Number.isFinite(input.metresPerUnit * input.scale)) {
    return massFailure('bad_input', 'Unit and scale must be positive numbers.');
  }
  for (const value of [input.densityKgPerM3, input.targetMassKg, input.arealDensityKgPerM2, input.wallM]) {
    if (given(value) && (!(value > 0) || !Number.isFinite(value))) return massFailure('bad_input', 'Density, weight per area, wall and target mass must be positive numbers.');
  }
  const length = input.metresPerUnit * input.scale;
  const surface = gather(components.map((c) => ({ measure: c.surface.area, centroid: c.surface.centroid, centralSecond: c.surface.centralSecond, error: c.surfaceErrorEstimate })));
  const areaM2 = surface.measure * length * length;
  if (construction === 'sheet') {
    const areal = given(input.targetMassKg) ? input.targetMassKg / areaM2 : input.arealDensityKgPerM2;
    if (!given(areal)) return massFailure('no_mass', 'Set a weight per area or a target mass.');
    return finish(surface, length, areal * length * length, { volumeM3: null, areaM2, densityKgPerM3: null, arealDensityKgPerM2: areal });
  }
  const solid = gather(components.map((c) => ({ measure: c.solid.volume, centroid: c.solid.centroid, centralSecond: c.solid.centralSecond, error: c.errorEstimate })));
  if (!(solid.measure > 0)) return massFailure('inside_out', 'The part encloses no positive volume; reverse its faces or make it a sheet.');
  if (construction === 'hollow') return hollowProperties(input, length, areaM2, solid.measure);
  const volumeM3 = solid.measure * length ** 3;
  const density = given(input.targetMassKg) ? input.targetMassKg / volumeM3 : input.densityKgPerM3;
  if (!given(density)) return massFailure('no_mass', 'Set a density or a target mass.');
  return finish(solid, length, density * length ** 3, { volumeM3, areaM2, densityKgPerM3: density, arealDensityKgPerM2: null });
}

/** A hollow part: the wall of each component, in the density's material. Scale acts on the geometry alone, so the wall keeps its thickness in metres. */
function hollowProperties(input: MassInput, length: number, areaM2: number, enclosed: number): MassProperties | MassFailure {
  if (!given(input.wallM)) return massFailure('no_wall', 'Set the wall thickness.');
  const components: HollowComponent[] = [];
  for (const { solid, hollow, hollowLimits } of input.components) if (hollow !== null && hollowLimits !== null) components.push({ solid, hollow, hollowLimits });
  if (components.length < input.components.length) {
    return massFailure('wall_not_measured', 'This version was measured before hollow parts could be weighed; import its file again.');
  }
  const t = input.wallM / length;
  const pieces = components.map((component) => wallMoments(component, t));
  const inner = pieces.reduce((sum, piece) => sum + piece.innerArea, 0);
  const wall = gather(pieces);
  if (!(inner > 0) || !(wall.measure > 0) || !(wall.measure < enclosed)) {
    return massFailure('wall_too_thick', 'The wall leaves no hollow in the part; make it thinner or the part solid.');
  }
  const volumeM3 = wall.measure * length ** 3;
  const density = given(input.targetMassKg) ? input.targetMassKg / volumeM3 : input.densityKgPerM3;
  if (!given(density)) return massFailure('no_mass', 'Set a density or a target mass.');
  return finish(wall, length, density * length ** 3, { volumeM3, areaM2, densityKgPerM3: density, arealDensityKgPerM2: null, tightBend: tightBend(components, t, length) });
}

function tightBend(components: readonly HollowComponent[], t: number, length: number): TightBend | null {
  const tightest = components.reduce((worst, one) => (one.hollowLimits.curvature > worst.hollowLimits.curvature ? one : worst)).hollowLimits;
  if (!(t * tightest.curvature > 1)) return null;
  const [x, y, z] = tightest.position;
  return { radiusM: length / tightest.curvature, positionM: [x * length, y * length, z * length] };
}

/** `massPerMeasure` is the mass of one file unit cubed (or squared, for sheets). */
function finish(
  body: Gathered, length: number, massPerMeasure: number,
  amounts: Pick<MassProperties, 'volumeM3' | 'areaM2' | 'densityKgPerM3' | 'arealDensityKgPerM2'> & Partial<Pick<MassProperties, 'tightBend'>>,
): MassProperties | MassFailure {
  const massKg = massPerMeasure * body.measure;
  const comM: Three = [body.centroid[0] * length, body.centroid[1] * length, body.centroid[2] * length];
  const factor = massPerMeasure * length * length;
  const inertiaKgM2 = inertiaOfSecondMoments(body.second.map((value) => value * factor) as Six).map((value) => value + 0) as Six;
  return framed({ massKg, comM, inertiaKgM2, numericError: body.error, tightBend: null, ...amounts });
}

type Unframed = Omit<MassProperties, 'ok' | 'principalKgM2' | 'quatWxyz' | 'freeAxes'>;

function framed(values: Unframed): MassProperties | MassFailure {
  if (!values.inertiaKgM2.every(Number.isFinite)) return massFailure('check_failed', 'The inertia matrix is not finite.');
  const freeGap = Math.max(FREE_AXES_GAP, 100 * values.numericError);
  const frame = principalAxes(values.inertiaKgM2, freeGap);
  const contradiction = checkMassFrame(values.massKg, values.comM, values.inertiaKgM2, frame, freeGap);
  if (contradiction !== null) return massFailure('check_failed', contradiction);
  return { ok: true, ...values, principalKgM2: frame.principal, quatWxyz: frame.quatWxyz, freeAxes: frame.freeAxes };
}

/** What a merge needs of each member. Areas and volumes add where all members have them. */
export type MassMember = Pick<MassProperties, 'massKg' | 'comM' | 'inertiaKgM2'> & Partial<Pick<MassProperties, 'volumeM3' | 'areaM2' | 'numericError'>>;

/** Several bodies as one rigid body, in one frame: masses add, inertia about the common centre of mass by the parallel-axis theorem. */
export function mergeMassProperties(members: readonly MassMember[]): MassProperties | MassFailure {
  if (members.length === 0) return massFailure('no_geometry', 'There is nothing to merge.');
  const massKg = members.reduce((sum, member) => sum + member.massKg, 0);
  const axis = (i: number): number => {
    const from = members[0].comM[i];
    return from + members.reduce((sum, member) => sum + member.massKg * (member.comM[i] - from), 0) / massKg;
  };
  const comM: Three = [axis(0), axis(1), axis(2)];
  let inertiaKgM2: Six = [0, 0, 0, 0, 0, 0];
  for (const member of members) {
    const moved = shiftInertia(member.inertiaKgM2, member.massKg, [member.comM[0] - comM[0], member.comM[1] - comM[1], member.comM[2] - comM[2]]);
    inertiaKgM2 = inertiaKgM2.map((value, i) => value + moved[i]) as Six;
  }
  let volumeM3: number | null = 0;
  for (const member of members) volumeM3 = volumeM3 === null || !given(member.volumeM3) ? null : volumeM3 + member.volumeM3;
  return framed({
    massKg,
    volumeM3,
    areaM2: members.reduce((sum, member) => sum + (member.areaM2 ?? 0), 0),
    densityKgPerM3: volumeM3 !== null && volumeM3 > 0 ? massKg / volumeM3 : null,
    arealDensityKgPerM2: null,
    comM,
    inertiaKgM2,
    tightBend: null,
    numericError: members.reduce((worst, member) => Math.max(worst, member.numericError ?? 0), 0),
  });
}
