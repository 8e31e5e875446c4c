/** Bounds on what one file may ask of memory. A cage is far below them; a damaged or hostile file is not. */
export interface MeshLimits {
  vertices: number;
  faces: number;
  /** Face corners in all. */
  corners: number;
  /** Distinct names of one kind (groups, objects or materials). */
  names: number;
  nameLength: number;
}

export const MESH_LIMITS: MeshLimits = {
  vertices: 16_000_000,
  faces: 16_000_000,
  corners: 64_000_000,
  names: 65_536,
  nameLength: 1_024,
};

/** Formats that cannot be read as a stream are held whole; this is the most that one of them may have. */
export const MOST_FILE_BYTES = 1 << 30;
/** A text that has to be one string in memory, beside the numbers read from it. */
export const MOST_TEXT_BYTES = 256 * 1024 * 1024;
export const MOST_LINE_BYTES = 4 * 1024 * 1024;
/** Beyond this the second moments of a solid leave the range of a double. */
export const MAX_COORDINATE = 1e50;
export const MIN_CORNERS = 3;
