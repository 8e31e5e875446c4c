import type { MeasuredComponent, MeasuredPart, SolidMoments, Three } from './measured';
import type { Frames } from './mesh/frames';
import { isOpenEdge } from './mesh/holes';
import type { Bodies } from './mesh/partition';
import type { Topology } from './mesh/topology';
import type { CapAmounts } from './moments/caps';
import { largestRuleDefect, solidErrorEstimate, surfaceErrorEstimate } from './moments/error-estimate';
import type { Integrated } from './moments/integrate-limit';
import { centralMoments, MOMENTS } from './moments/sums';
import { makeHollow } from './shell/make-hollow';
import type { ShellBody } from './shell/shell-sums';

/** Volume relative to the cube of a body's size below which a centroid would be rounding only. */
const NO_VOLUME = 1e-13;

/** From this share of caps in the closed area, or below this roundness, an open part is taken for a sheet. */
const SHEET_CAP_SHARE = 0.25;
const SHEET_ROUNDNESS = 0.02;

/** Puts the sums into parts and components; `shells` per body where they were measured. Holes are no part. */
export function assembleParts(
  mesh: Topology, bodies: Bodies, blocked: Uint8Array, frames: Frames, limit: Integrated, ownCage: Integrated, caps: CapAmounts,
  shells: readonly ShellBody[] | null = null,
): MeasuredPart[] {
  const parts = emptyParts(mesh, bodies);
  const faces = new Int32Array(bodies.bodies);
  for (let face = 0; face < mesh.faces; face++) faces[bodies.bodyOf[face]]++;
  const capArea = new Float64Array(parts.length);
  const capVolume = new Float64Array(parts.length);
  const defect = largestRuleDefect();
  for (let body = 0; body < bodies.bodies; body++) {
    const index = bodies.partOfBody[body];
    const part = parts[index];
    part.faces += faces[body];
    for (let axis = 0; axis < 3; axis++) {
      part.bounds[axis] = Math.min(part.bounds[axis], frames.boxes[6 * body + axis]);
      part.bounds[3 + axis] = Math.max(part.bounds[3 + axis], frames.boxes[6 * body + 3 + axis]);
    }
    if (blocked[body] === 1) continue;
    part.components.push(makeComponent(body, faces[body], frames, limit, ownCage, defect, shells?.[body] ?? null));
    capArea[index] += caps.area[body];
    capVolume[index] += caps.volume[body];
  }
  for (let i = 0; i < parts.length; i++) describeCaps(parts[i], capArea[i], capVolume[i]);
  // Theirs is the last one, so that the others keep their numbers.
  return bodies.holePart < 0 ? parts : parts.slice(0, bodies.holePart);
}

function emptyParts(mesh: Topology, bodies: Bodies): MeasuredPart[] {
  const parts: MeasuredPart[] = bodies.partNames.map((name) => ({
    name, faces: 0, maxValence: 0, components: [], bounds: [Infinity, Infinity, Infinity, -Infinity, -Infinity, -Infinity],
    capAreaShare: 0, capVolumeShare: 0, openEdges: 0, looksLikeSheet: false,
  }));
  const { vertexOf, starts } = mesh;
  const valence = new Int32Array(mesh.vertices);
  for (let h = 0; h < vertexOf.length; h++) valence[vertexOf[h]]++;
  for (const h of bodies.borders) {
    const face = mesh.faceOf[h];
    if (isOpenEdge(mesh, bodies, h)) parts[bodies.partOf[face]].openEdges++;
    if (mesh.twin[h] >= 0) continue;
    valence[vertexOf[h + 1 === starts[face + 1] ? starts[face] : h + 1]]++;
  }
  const most = new Int32Array(parts.length);
  for (let face = 0; face < mesh.faces; face++) {
    const part = bodies.partOf[face];
    for (let h = starts[face]; h < starts[face + 1]; h++) if (valence[vertexOf[h]] > most[part]) most[part] = valence[vertexOf[h]];
  }
  for (let i = 0; i < parts.length; i++) parts[i].maxValence = most[i];
  return parts;
}

function makeComponent(
  body: number, faces: number, frames: Frames, limit: Integrated, ownCage: Integrated, defect: number, shell: ShellBody | null,
): MeasuredComponent {
  const at = 3 * body;
  const origin: Three = [0, 1, 2].map((axis) => frames.pieceCentres[at + axis] + frames.origins[at + axis]) as Three;
  const box = frames.boxes.subarray(6 * body, 6 * body + 6);
  const size = Math.hypot(box[3] - box[0], box[4] - box[1], box[5] - box[2]) / 2;
  const area = limit.surface.total(body);
  const areaCentre: Three = area[0] > 0 ? [0, 1, 2].map((axis) => origin[axis] + area[1 + axis] / area[0]) as Three : origin;
  const none = NO_VOLUME * size ** 3;
  const moments = limit.solid.total(body);
  const solid = centralMoments(moments, origin, areaCentre, none);
  const cage: SolidMoments = limit === ownCage ? solid : centralMoments(ownCage.solid.total(body), origin, areaCentre, none);
  const surface = centralMoments(area, origin, areaCentre, 0);
  const surfaceError = surfaceErrorEstimate(area[0], limit.surfaceError[body]);
  const hollow = shell === null ? { hollow: null, hollowLimits: null } : makeHollow(area, surfaceError, shell, origin, solid.centroid, size);
  return {
    faces,
    solid,
    surface: { area: surface.volume, centroid: surface.centroid, centralSecond: surface.centralSecond },
    cage,
    ...hollow,
    errorEstimate: solidErrorEstimate(moments[0], limit.solid.magnitudes[body], limit.closingError, MOMENTS * body, size, defect),
    surfaceErrorEstimate: surfaceError,
  };
}

function describeCaps(part: MeasuredPart, capArea: number, capVolume: number): void {
  const area = part.components.reduce((sum, component) => sum + component.surface.area, 0);
  const volume = Math.abs(part.components.reduce((sum, component) => sum + component.solid.volume, 0));
  if (capArea > 0) {
    part.capAreaShare = capArea / (area + capArea);
    part.capVolumeShare = volume > 0 ? Math.min(1, capVolume / volume) : 1;
  }
  if (part.openEdges === 0) return;
  // 36 π V² / A³ is 1 for a sphere.
  const roundness = (36 * Math.PI * volume * volume) / (area + capArea) ** 3;
  part.looksLikeSheet = part.capAreaShare > SHEET_CAP_SHARE || !(roundness > SHEET_ROUNDNESS);
}
