/** The rule of refinement that turns a control cage into its limit surface; `polyhedral` takes the cage as it is. */
export const SCHEMES = ['catmull-clark', 'loop', 'doo-sabin', 'polyhedral'] as const;
export type Scheme = (typeof SCHEMES)[number];

/** What happens at an open border: corners round off (`edge-only`) or stay (`edge-and-corner`, the scene-description standard's default). */
export const BOUNDARIES = ['edge-and-corner', 'edge-only'] as const;
export type Boundary = (typeof BOUNDARIES)[number];

export const TRIANGLE_RULES = ['catmark', 'smooth'] as const;
export type TriangleRule = (typeof TRIANGLE_RULES)[number];

export const CREASING_RULES = ['uniform', 'chaikin'] as const;
export type CreasingRule = (typeof CREASING_RULES)[number];

/** What makes a part: the file's groups, objects or materials, connected pieces, dominant skin joint, or the whole file. */
export const PARTITIONS = ['group', 'object', 'material', 'piece', 'joint', 'whole'] as const;
export type Partition = (typeof PARTITIONS)[number];

/** One labelling of a cage's faces. `labels[f]` indexes `names`; -1 marks a face without a label. */
export interface FaceLabels {
  names: string[];
  labels: Int32Array;
}

/**
 * A control cage as read from a file, in the file's own unit and frame.
 * Faces are polygons in compressed rows: face f has the vertices `faceVertices[faceStarts[f] .. faceStarts[f + 1])`,
 * counter-clockwise seen from outside. Indices count from 0.
 */
export interface Cage {
  /** x, y, z of each vertex; length 3 V. */
  positions: Float64Array;
  /** Length F + 1. */
  faceStarts: Uint32Array;
  faceVertices: Uint32Array;
  groups: FaceLabels | null;
  objects: FaceLabels | null;
  materials: FaceLabels | null;
  /** Dominant skin joint of each face, where the file carries weights. */
  joints: FaceLabels | null;
  /** Tagged edges: vertex pairs (length 2 E) with their sharpness (length E, 32-bit as the standard stores it; ≥ 10 is infinite). */
  creaseVertices: Uint32Array;
  creaseSharpness: Float32Array;
  /** Tagged vertices and their sharpness. */
  cornerVertices: Uint32Array;
  cornerSharpness: Float32Array;
  /** Faces that the file marks as holes, in any order: they shape the surface and are no part of it. Left out where there are none. */
  holes?: Uint32Array;
  /** Boundary rule that the file itself asks for; null where it is silent. */
  boundary: Boundary | null;
  /** Scheme and triangle rule that the file itself asks for; null or left out where it is silent. */
  scheme?: Scheme | null;
  triangles?: TriangleRule | null;
  /** Line of each face in the file (from 1), for places in messages; null where the format has none. */
  faceLines: Uint32Array | null;
  /** Metres per file unit and up axis, where the format says so. */
  metresPerUnit: number | null;
  upAxis: 'y' | 'z' | null;
  /** What was odd but could be read. */
  warnings: FormatWarning[];
}

/** What a file held that was odd but could be read; line and column from 1. */
export interface FormatWarning {
  code: string;
  message: string;
  line: number | null;
  column: number | null;
}
