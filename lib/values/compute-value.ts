import type { ValueFinding } from '@/db/schema/part-current';
import { massProperties, type MassFailureCode, type MassProperties, type TightBend } from '@/lib/engine/mass-properties';
import type { MassSource, ValueState } from '@/lib/rules/states';
import { massSource } from './mass-source';
import { valueCanonical, valueHash } from './value-canonical';
import type { ValueInputs } from './value-inputs';

/** Problems that do not forbid the value of a sheet: it has a border and encloses nothing. */
export const NO_PROBLEM_OF_A_SHEET: ReadonlySet<string> = new Set(['open_border', 'inside_out']);

/** A part's numbers as they stand in its row: SI, the asset's axes, inertia about the centre of mass as matrix entries. */
export interface ComputedValue {
  state: Extract<ValueState, 'unset' | 'blocked' | 'measured' | 'left_out'>;
  massSource: MassSource | null;
  /** Null unless the state is measured. */
  properties: MassProperties | null;
  /** The text behind the hash (see valueCanonical). */
  canonical: string | null;
  valueSha256: string | null;
  densityKgPerM3: number | null;
  arealDensityKgPerM2: number | null;
  areaM2: number | null;
  /** Enclosed by the limit surface; null for sheets and where it is not positive. */
  volumeM3: number | null;
  cageVolumeM3: number | null;
  numericError: number | null;
  boundsM: number[];
  problemCodes: string[];
  warningCodes: string[];
  valueFindings: ValueFinding[];
}

const FAILURE_CODES: Record<MassFailureCode, string> = {
  no_mass: 'no_mass',
  no_geometry: 'no_geometry',
  bad_input: 'value_out_of_range',
  inside_out: 'inside_out',
  no_wall: 'wall_missing',
  wall_too_thick: 'wall_too_thick',
  wall_not_measured: 'wall_not_measured',
  check_failed: 'value_check_failed',
};

/**
 * The value that follows from geometry, setting and scale, with its state. A number that does not pass the checks is a finding
 * and no value. A volume is given without a mass too.
 */
export function computeValue(inputs: ValueInputs): ComputedValue {
  const { setting, components } = inputs;
  const excused = (code: string): boolean => setting.construction === 'sheet' && NO_PROBLEM_OF_A_SHEET.has(code);
  const codesOf = (severity: string): string[] => [...new Set(inputs.findings.filter((one) => one.severity === severity && !excused(one.code)).map((one) => one.code))];
  const problemCodes = codesOf('problem');
  const { applied, missing } = massSource(setting);
  const value: ComputedValue = {
    state: 'unset',
    massSource: applied?.source ?? null,
    properties: null,
    canonical: null,
    valueSha256: null,
    densityKgPerM3: setting.densityKgPerM3 ?? setting.material?.densityKgPerM3 ?? null,
    arealDensityKgPerM2: setting.arealDensityKgPerM2 ?? setting.material?.arealDensityKgPerM2 ?? null,
    ...geometryNumbers(inputs),
    problemCodes,
    warningCodes: codesOf('warning'),
    valueFindings: [],
  };
  const note = (severity: ValueFinding['severity'], code: string, message: string): void => {
    value.valueFindings.push({ code, severity, message });
    const codes = severity === 'problem' ? value.problemCodes : value.warningCodes;
    if (!codes.includes(code)) codes.push(code);
  };
  if (missing) note('warning', missing.code, missing.message);
  if (problemCodes.length === 0 && components.length === 0) note('problem', 'no_geometry', 'The part could not be measured.');
  if (value.problemCodes.length > 0) value.state = 'blocked';
  else if (applied) {
    const { source, ...given } = applied;
    const properties = massProperties({
      components,
      metresPerUnit: inputs.metresPerUnit,
      scale: inputs.scale,
      construction: setting.construction,
      wallM: setting.construction === 'hollow' ? setting.wallM : null,
      ...given,
    });
    const contradiction = properties.ok ? findUnstorable(properties) : null;
    if (!properties.ok) {
      note('problem', FAILURE_CODES[properties.code], properties.message);
      value.state = 'blocked';
    } else if (contradiction) {
      note('problem', 'value_check_failed', contradiction);
      value.state = 'blocked';
    } else {
      value.state = 'measured';
      value.properties = { ...properties, quatWxyz: properties.quatWxyz.map(withSquare) as MassProperties['quatWxyz'] };
      value.densityKgPerM3 = source === 'target_mass' || setting.construction !== 'sheet' ? properties.densityKgPerM3 : value.densityKgPerM3;
      value.arealDensityKgPerM2 = properties.arealDensityKgPerM2;
      value.numericError = properties.numericError;
      if (properties.tightBend) note('warning', 'wall_over_radius', describeTightBend(properties.tightBend));
      value.canonical = valueCanonical(inputs, value);
      value.valueSha256 = valueHash(value.canonical);
    }
  }
  if (setting.leftOut) return { ...value, state: 'left_out', properties: null, canonical: null, valueSha256: null };
  return value;
}

function describeTightBend({ radiusM, positionM }: TightBend): string {
  const [x, y, z] = positionM.map(figure);
  return `The wall is thicker than the smallest radius of the surface, ${figure(radiusM)} m at ${x}, ${y}, ${z} m, and overlaps itself there. Make it thinner, or the part solid.`;
}

function figure(value: number): string {
  return String(Number(value.toPrecision(4)));
}

/** A component whose square would vanish below the smallest double is 0: the database squares it to check the unit length. */
function withSquare(component: number): number {
  return Math.abs(component) < 1e-150 ? 0 : component;
}

/** Kilograms or kg·m², whose products and sums over a show stay within what a double can hold: the database refuses what leaves it. */
const SMALLEST_MOMENT = 1e-290;
const LARGEST = 1e150;

/** What the row's constraints in the database would refuse, as a sentence; null where all is well. */
function findUnstorable(value: MassProperties): string | null {
  const [i1, i2, i3] = value.principalKgM2;
  const [w, x, y, z] = value.quatWxyz;
  if (!(i3 > SMALLEST_MOMENT && value.massKg > SMALLEST_MOMENT)) return 'The moments are too small for a double; the part is too small or too light.';
  if (!(i3 < LARGEST && value.massKg < LARGEST)) return 'The mass or its moments are out of all proportion; the part is too large or too heavy.';
  if (!(i1 >= 0 && i1 <= i2 && i2 <= i3 && i1 + i2 >= i3 - 1e-13 * i3)) return 'The principal moments cannot belong to a body.';
  if (!(w >= 0 && Math.abs(w * w + x * x + y * y + z * z - 1) < 1e-12)) return 'The principal axes are no rotation.';
  if (!(value.numericError >= 0 && value.numericError < Infinity)) return 'The error of the integration could not be estimated.';
  const follows = [value.densityKgPerM3, value.arealDensityKgPerM2];
  if (follows.some((one) => one !== null && !(one > 0 && one < Infinity))) return 'The density that follows from the mass is out of range.';
  return null;
}

type GeometryNumbers = Pick<ComputedValue, 'areaM2' | 'volumeM3' | 'cageVolumeM3' | 'numericError' | 'boundsM'>;

function geometryNumbers({ components, metresPerUnit, scale, setting, bounds }: ValueInputs): GeometryNumbers {
  const length = metresPerUnit * scale;
  const boundsM = bounds.map((value) => value * length);
  if (components.length === 0) return { areaM2: null, volumeM3: null, cageVolumeM3: null, numericError: null, boundsM };
  const sum = (of: (component: ValueInputs['components'][number]) => number): number => components.reduce((total, component) => total + of(component), 0);
  const volume = sum((one) => one.solid.volume);
  const isSheet = setting.construction === 'sheet';
  const error = isSheet
    ? sum((one) => one.surface.area * one.surfaceErrorEstimate) / sum((one) => one.surface.area)
    : sum((one) => Math.abs(one.solid.volume) * one.errorEstimate) / Math.abs(volume);
  const volumeM3 = volume * length ** 3;
  const areaM2 = sum((one) => one.surface.area) * length * length;
  return {
    areaM2: Number.isFinite(areaM2) ? areaM2 : null,
    volumeM3: !isSheet && volumeM3 > 0 && Number.isFinite(volumeM3) ? volumeM3 : null,
    cageVolumeM3: isSheet ? null : sum((one) => one.cageVolume) * length ** 3,
    numericError: Number.isFinite(error) ? error : null,
    boundsM,
  };
}
