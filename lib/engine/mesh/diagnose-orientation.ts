import type { Cage } from '../cage';
import type { MeasuredPart } from '../measured';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import { halfEdgeEnds } from './match-edges';
import { diagnoseNesting, nestedPieces } from './nesting';
import { isOpenEdge } from './holes';
import type { Bodies } from './partition';
import type { PieceRelations } from './relate-pieces';
import type { Topology } from './topology';

/** Findings that need the measured numbers: open borders with a guess at sheets, bodies that enclose negative volume, and bodies inside others. */
export function diagnoseOrientation(
  cage: Cage, mesh: Topology, bodies: Bodies, blocked: Uint8Array, parts: MeasuredPart[], relations: PieceRelations, findings: FindingList,
): void {
  const firstFace = new Int32Array(bodies.bodies).fill(-1);
  for (let face = mesh.faces - 1; face >= 0; face--) firstFace[bodies.bodyOf[face]] = face;
  const besideHoles = new Int32Array(parts.length);
  for (const h of bodies.borders) {
    if (!isOpenEdge(mesh, bodies, h)) continue;
    const face = mesh.faceOf[h];
    if (blocked[bodies.bodyOf[face]] === 1) continue;
    const part = parts[bodies.partOf[face]];
    if (mesh.twin[h] >= 0) besideHoles[bodies.partOf[face]]++;
    const edge = halfEdgeEnds(mesh, h);
    findings.add('open_border', 'problem', part.name, placeOf({ face, edge, position: positionOf(cage, edge[0]), line: cage.faceLines?.[face] ?? null }),
      (n) => openBorderMessage(n, besideHoles[bodies.partOf[face]], part));
  }
  const component = new Int32Array(parts.length);
  const nested = nestedPieces(bodies, relations);
  const inverted = new Uint8Array(nested.length);
  for (let body = 0; body < bodies.bodies; body++) {
    const partIndex = bodies.partOfBody[body];
    const part = parts[partIndex];
    if (blocked[body] === 1) continue;
    const measured = part.components[component[partIndex]++];
    if (!(measured.solid.volume < 0) || part.looksLikeSheet) continue;
    const face = firstFace[body];
    const position = positionOf(cage, mesh.vertexOf[mesh.starts[face]]);
    const piece = relations.pieceOf[face];
    if (nested[piece] === 1 || (part.openEdges > 0 && position !== null && isInsideOther(cage, mesh, bodies, body, position))) {
      nested[piece] = 1;
      inverted[piece] = 1;
    } else {
      findings.add('inside_out', 'problem', part.name, placeOf({ face, position }),
        (n) => `${counted(n, 'body is', 'bodies are')} inside out; reverse ${n === 1 ? 'its' : 'their'} faces, or import again with faces turned outwards.`);
    }
  }
  diagnoseNesting(cage, mesh, bodies, relations, nested, inverted, findings);
}

function openBorderMessage(edges: number, besideHoles: number, part: MeasuredPart): string {
  const holes = besideHoles === 0 ? '' : besideHoles === edges ? ', beside faces that are holes in the file' : `, ${besideHoles} of them beside faces that are holes in the file`;
  const open = `${counted(edges, 'edge has', 'edges have')} one face only${holes}`;
  if (part.looksLikeSheet) return `${open}; the part looks like a sheet: set its construction to sheet, or close the surface.`;
  const share = (100 * part.capAreaShare).toPrecision(2);
  return `${open}; close the holes, whose caps make up ${share} % of the closed area, or set the construction to sheet.`;
}

/** Whether a point lies inside the other bodies of a part with holes, where no ray can tell: the winding number of the cage's triangles about it [Van Oosterom & Strackee 1983]. */
function isInsideOther(cage: Cage, mesh: Topology, bodies: Bodies, body: number, point: readonly number[]): boolean {
  let angle = 0;
  const p = cage.positions;
  const at = (vertex: number): number[] => [p[3 * vertex] - point[0], p[3 * vertex + 1] - point[1], p[3 * vertex + 2] - point[2]];
  for (let face = 0; face < mesh.faces; face++) {
    if (bodies.bodyOf[face] === body || bodies.partOf[face] !== bodies.partOfBody[body]) continue;
    const start = mesh.starts[face];
    const a = at(mesh.vertexOf[start]);
    for (let h = start + 1; h + 1 < mesh.starts[face + 1]; h++) angle += solidAngle(a, at(mesh.vertexOf[h]), at(mesh.vertexOf[h + 1]));
  }
  return angle / (4 * Math.PI) > 0.5;
}

function solidAngle(a: number[], b: number[], c: number[]): number {
  const dot = (x: number[], y: number[]): number => x[0] * y[0] + x[1] * y[1] + x[2] * y[2];
  const la = Math.sqrt(dot(a, a)), lb = Math.sqrt(dot(b, b)), lc = Math.sqrt(dot(c, c));
  const det = a[0] * (b[1] * c[2] - b[2] * c[1]) + a[1] * (b[2] * c[0] - b[0] * c[2]) + a[2] * (b[0] * c[1] - b[1] * c[0]);
  return 2 * Math.atan2(det, la * lb * lc + dot(a, b) * lc + dot(a, c) * lb + dot(b, c) * la);
}
