import { massProperties, type MassProperties } from '../engine/mass-properties';
import type { Finding, MeasuredComponent, MeasuredPart, Six, Three } from '../engine/measured';
import { csvRecord, type CsvCell } from '../formats/csv';

/** One part of one file as the command line prints it. Null where a problem forbids a number. */
export interface MeasureRecord {
  file: string;
  part: string;
  faces: number;
  max_valence: number;
  /** Moments at unit density about the file's origin, in its unit; second: xx yy zz xy xz yz. */
  volume: number | null;
  first: Three | null;
  second: Six | null;
  rel_error: number | null;
  mass_kg: number | null;
  com_m: Three | null;
  /** About the centre of mass: ixx iyy izz ixy ixz iyz, with ixy = −∫ρxy dV. */
  inertia_kg_m2: Six | null;
  principal_kg_m2: Three | null;
  quat_wxyz: [number, number, number, number] | null;
  free_axes: string | null;
  problems: Finding[];
}

export interface MeasureRecordInput {
  file: string;
  part: MeasuredPart;
  findings: Finding[];
  metresPerUnit: number;
  densityKgPerM3: number;
}

/** A part's moments about the origin and its mass properties as a solid of the given density. */
export function measureRecord({ file, part, findings, metresPerUnit, densityKgPerM3 }: MeasureRecordInput): MeasureRecord {
  const measured = part.components.length > 0;
  const moments = measured ? momentsAboutOrigin(part.components) : null;
  const mass = measured ? massProperties({ components: part.components, metresPerUnit, scale: 1, construction: 'solid', densityKgPerM3 }) : null;
  const problems = findings.filter((finding) => finding.part === null || finding.part === part.name);
  const held: MassProperties | null = mass?.ok ? mass : null;
  if (mass && !mass.ok && !problems.some((finding) => finding.severity === 'problem')) {
    problems.push({ code: mass.code, severity: 'problem', message: mass.message, part: part.name, count: 1, places: [] });
  }
  return {
    file,
    part: part.name,
    faces: part.faces,
    max_valence: part.maxValence,
    volume: moments?.volume ?? null,
    first: moments?.first ?? null,
    second: moments?.second ?? null,
    rel_error: moments?.relError ?? null,
    mass_kg: held?.massKg ?? null,
    com_m: held?.comM ?? null,
    inertia_kg_m2: held?.inertiaKgM2 ?? null,
    principal_kg_m2: held?.principalKgM2 ?? null,
    quat_wxyz: held?.quatWxyz ?? null,
    free_axes: held?.freeAxes ?? null,
    problems,
  };
}

/** Sums components and moves them to the file's origin: first = V c, second = central + V c cᵀ, component by component. */
function momentsAboutOrigin(components: readonly MeasuredComponent[]) {
  const first: Three = [0, 0, 0];
  const second: Six = [0, 0, 0, 0, 0, 0];
  let volume = 0;
  let error = 0;
  for (const { solid, errorEstimate } of components) {
    const [x, y, z] = solid.centroid;
    const products = [x * x, y * y, z * z, x * y, x * z, y * z];
    volume += solid.volume;
    error += errorEstimate * Math.abs(solid.volume);
    for (let i = 0; i < 3; i++) first[i] += solid.volume * solid.centroid[i];
    for (let i = 0; i < 6; i++) second[i] += solid.centralSecond[i] + solid.volume * products[i];
  }
  return { volume, first, second, relError: volume === 0 ? null : error / Math.abs(volume) };
}

const CSV_HEADER = [
  'file', 'part', 'faces', 'max_valence', 'volume',
  'first_x', 'first_y', 'first_z',
  'second_xx', 'second_yy', 'second_zz', 'second_xy', 'second_xz', 'second_yz',
  'rel_error', 'mass_kg', 'com_x_m', 'com_y_m', 'com_z_m',
  'ixx_kg_m2', 'iyy_kg_m2', 'izz_kg_m2', 'ixy_kg_m2', 'ixz_kg_m2', 'iyz_kg_m2',
  'i1_kg_m2', 'i2_kg_m2', 'i3_kg_m2',
  'axes_quat_w', 'axes_quat_x', 'axes_quat_y', 'axes_quat_z',
  'free_axes', 'problems',
];

export function csvHeader(): string {
  return csvRecord(CSV_HEADER, { guard: false });
}

/** The record as one line of CSV; findings become their codes, joined by blanks. */
export function csvLine(record: MeasureRecord): string {
  const spread = (values: readonly number[] | null, length: number): CsvCell[] => (values ? [...values] : new Array<CsvCell>(length).fill(null));
  return csvRecord(
    [
      record.file, record.part, record.faces, record.max_valence, record.volume,
      ...spread(record.first, 3),
      ...spread(record.second, 6),
      record.rel_error, record.mass_kg,
      ...spread(record.com_m, 3),
      ...spread(record.inertia_kg_m2, 6),
      ...spread(record.principal_kg_m2, 3),
      ...spread(record.quat_wxyz, 4),
      record.free_axes, record.problems.map((finding) => finding.code).join(' '),
    ],
    { guard: false },
  );
}
