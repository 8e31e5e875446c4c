import type { Boundary, CreasingRule, Partition, Scheme, TriangleRule } from './cage';

/** How a cage is measured. All of it is part of a geometry record's key. */
export interface MeasureOptions {
  scheme: Scheme;
  boundary: Boundary;
  triangles: TriangleRule;
  creasing: CreasingRule;
  partsBy: Partition;
  /** Joins vertices on open borders that lie on each other before measuring; not unless true. */
  weld?: boolean;
  /** Turns faces one way and outwards before measuring; not unless true. */
  turnFaces?: boolean;
  /** Measures the walls of hollow parts too; not unless true. No other number depends on it, so it is in no key. */
  shells?: boolean;
}

/** problem: no value; warning: a value to be looked at; note: worth knowing. */
export type Severity = 'problem' | 'warning' | 'note';

/** Where a finding sits. Faces, edges and vertices are numbered from 0 as in the cage; line is that of the file, from 1. */
export interface Place {
  face: number | null;
  /** The two vertices of an edge. */
  edge: [number, number] | null;
  vertex: number | null;
  position: [number, number, number] | null;
  line: number | null;
}

/** A finding of the diagnosis: a stable code, a sentence that says what to do, and the first places (at most PLACES_KEPT) of `count`. */
export interface Finding {
  code: string;
  severity: Severity;
  message: string;
  /** The part concerned; null when the whole file is. */
  part: string | null;
  count: number;
  places: Place[];
}

/** Places kept per finding; `count` has the true number. */
export const PLACES_KEPT = 20;

/** xx, yy, zz, xy, xz, yz: integrals of products of coordinates (matrix entries of ∫ x xᵀ, not of the inertia matrix). */
export type Six = [number, number, number, number, number, number];
export type Three = [number, number, number];

/** Moments of a solid at unit density: volume, centroid in the file's frame, second moments about that centroid. File units. */
export interface SolidMoments {
  volume: number;
  centroid: Three;
  centralSecond: Six;
}

/** Moments of a surface at unit areal density, the same way. */
export interface SurfaceMoments {
  area: number;
  centroid: Three;
  centralSecond: Six;
}

/** How far the polynomials of a hollow component may be trusted. */
export interface ShellLimits {
  /** Largest inward principal curvature of its surface, 1/length, and where (file frame): walls thicker than 1/curvature overlap themselves there. 0 where it never bends inwards. */
  curvature: number;
  position: Three;
  /** Coefficients of t, t², t³ of what the wall's volume may be off by, and the moments of degree k relative to size^k: integration, and (t³) the corners where sharp edges meet. */
  error: Three;
}

/**
 * A connected component of a part: what a geometry record stores. Signed volume: negative when the component is inside out or bounds a cavity.
 * `hollow` holds the coefficients of the shell's ten moments about `solid.centroid` as polynomials in the wall thickness:
 * for each moment in the order 1, x, y, z, xx, yy, zz, xy, xz, yz the coefficients of t¹ … t⁵ (unused ones 0), length 50; null where it was not computed.
 */
export interface MeasuredComponent {
  faces: number;
  solid: SolidMoments;
  surface: SurfaceMoments;
  /** Polyhedral moments of the control cage's own faces of this component. */
  cage: SolidMoments;
  hollow: Float64Array | null;
  hollowLimits: ShellLimits | null;
  /** Estimate of max |Δ| / (|V|·L^degree) of the integration alone (coordinates taken as exact). */
  errorEstimate: number;
  /** Relative error estimate of the surface moments. */
  surfaceErrorEstimate: number;
}

/** A part with its components (none where a problem forbids a number); lengths in file units. */
export interface MeasuredPart {
  name: string;
  faces: number;
  maxValence: number;
  components: MeasuredComponent[];
  /** Axis-aligned box of the part's limit surface (or a box that is at most its control points'), file units: min xyz, max xyz. */
  bounds: [number, number, number, number, number, number];
  /** Caps over borders to other parts and over real holes: share of the closed part's area and of its |volume|; 0 where there are none. */
  capAreaShare: number;
  capVolumeShare: number;
  /** Edges with one face only (real holes, faces that the file marks as holes, or an open sheet), as opposed to borders to other parts. */
  openEdges: number;
  /** Rough guess that an open part is meant as a sheet. */
  looksLikeSheet: boolean;
}

/** What measuring a cage gave: its parts and everything that was found. */
export interface MeasuredCage {
  parts: MeasuredPart[];
  findings: Finding[];
  faces: number;
  vertices: number;
}
