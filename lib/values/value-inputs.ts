import type { MassComponent } from '@/lib/engine/mass-properties';
import type { Construction } from '@/lib/rules/states';
import type { UpAxis } from '@/lib/rules/units';

/** A finding of a geometry record that concerns the part (or its whole file). */
export interface RecordFinding {
  code: string;
  severity: 'problem' | 'warning' | 'note';
}

/** A material as it is now. */
export interface MaterialNow {
  id: string;
  name: string;
  revision: number;
  densityKgPerM3: number | null;
  arealDensityKgPerM2: number | null;
}

/** What somebody decided about a part; all null and false where nobody did yet. Lengths in metres, never scaled. */
export interface MassSetting {
  construction: Construction;
  targetMassKg: number | null;
  densityKgPerM3: number | null;
  material: MaterialNow | null;
  arealDensityKgPerM2: number | null;
  wallM: number | null;
  variant: string | null;
  leftOut: boolean;
}

export const NO_SETTING: MassSetting = {
  construction: 'solid',
  targetMassKg: null,
  densityKgPerM3: null,
  material: null,
  arealDensityKgPerM2: null,
  wallM: null,
  variant: null,
  leftOut: false,
};

/** Key of the geometry record: the same key means the same measurement. */
export interface RecordKey {
  contentSha256: string;
  scheme: string;
  boundary: string;
  triangles: string;
  creasing: string;
  partsBy: string;
  /** What was done to the cage beyond reading its file: `weld`, `turn_faces`, `scaled_by_…`, `y-to-z` or `z-to-y`, `beside_…`, joined by blanks; else empty. */
  mended?: string;
  engineVersion: string;
}

/** Everything that a part's value follows from. Geometry in the show's unit and axes. */
export interface ValueInputs {
  record: RecordKey;
  /** Code of the asset. */
  asset: string;
  part: string;
  upAxis: UpAxis;
  metresPerUnit: number;
  scale: number;
  setting: MassSetting;
  components: readonly (MassComponent & { cageVolume: number })[];
  /** Box: min x, y, z, max x, y, z. */
  bounds: readonly number[];
  findings: readonly RecordFinding[];
}
