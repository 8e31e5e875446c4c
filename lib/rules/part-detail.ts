import type { QueueRow } from './approval-queue';
import type { AssetTotal, PartRow, RowFinding } from './part-row';
import type { ShotSlot } from './shot-detail';
import type { Construction, Origin } from './states';

/** Where a finding sits in the cage. Faces, edges and vertices count from 0, lines of the file from 1; positions in file units. */
export interface FindingPlace {
  face: number | null;
  edge: [number, number] | null;
  vertex: number | null;
  position: [number, number, number] | null;
  line: number | null;
}

/** A finding with its first places (of `count`); one of a setting has none. */
export interface DetailFinding extends RowFinding {
  places: FindingPlace[];
}

/** A part as one version of its asset has it; SI, at the asset's scale. */
export interface PartVersion {
  version: string;
  current: boolean;
  /** When it was imported (ISO 8601) and by whom. */
  created_at: string;
  created_by: string;
  /** False where this version does not have the part; then the numbers are null. */
  present: boolean;
  faces: number | null;
  volume_m3: number | null;
  cage_volume_m3: number | null;
  area_m2: number | null;
}

/** What somebody once set, newest first. */
export interface PartSetting {
  construction: Construction;
  target_mass_kg: number | null;
  density_kg_m3: number | null;
  material: string | null;
  areal_density_kg_m2: number | null;
  wall_m: number | null;
  variant: string | null;
  left_out: boolean;
  set_by: string;
  set_from: Origin;
  set_at: string;
}

/** How the current version was measured. */
export interface MeasuredAs {
  scheme: string;
  boundary: string;
  creasing: string;
  triangles: string;
  parts_by: string;
  /** Whether the import joined vertices on open borders and turned faces outwards before measuring. */
  weld: boolean;
  turn_faces: boolean;
  engine_version: string;
  /** SHA-256 of the file's bytes. */
  content_sha256: string;
}

/** Answer of GET /api/v1/shows/{show}/assets/{asset}/parts/{part}. */
export interface PartDetail {
  row: PartRow;
  findings: DetailFinding[];
  versions: PartVersion[];
  settings: PartSetting[];
  /** The shots that the part is in. */
  shots: ShotSlot[];
  /** How its value stands to its last approval; null while it has none. */
  approval: QueueRow | null;
  measured_as: MeasuredAs;
  /** Shares of the closed part's area and volume that are caps over its borders and holes. */
  cap_area_share: number;
  cap_volume_share: number;
}

export interface AssetVersionEntry {
  version: string;
  current: boolean;
  created_at: string;
  created_by: string;
  faces: number;
  /** Name of the file it came from; null where it was not imported as one. */
  file: string | null;
}

/** Answer of GET /api/v1/shows/{show}/assets/{asset}. */
export interface AssetDetail {
  total: AssetTotal;
  scale: number;
  outside_id: string | null;
  parts: PartRow[];
  /** Findings of the whole file, and of its parts under their names. */
  findings: (DetailFinding & { part: string | null })[];
  versions: AssetVersionEntry[];
  /** How the values of its parts stand to their last approvals; parts without a value are absent. */
  approvals: QueueRow[];
  measured_as: MeasuredAs;
}
