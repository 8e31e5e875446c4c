import type { Cage } from '../cage';
import type { MeasureOptions } from '../measured';
import { cageVolumes } from './cage-volumes';
import { rebuildFaces } from './rebuild-faces';
import { partitionFaces } from './partition';
import { relatePieces } from './relate-pieces';
import { buildTopology, type Topology } from './topology';
import { findTurnedFaces } from './turned-faces';

/** The question whether a piece lies inside another is put to the cage itself. */
const AS_CAGE: MeasureOptions = { scheme: 'polyhedral', boundary: 'edge-only', triangles: 'catmark', creasing: 'uniform', partsBy: 'piece' };

/**
 * Faces (ascending) that have to be reversed so that every piece is turned one way and outwards: in a piece that is of two minds the fewer faces
 * (see findTurnedFaces), then all faces of a closed piece that encloses negative volume, unless it lies inside another piece, where it is a cavity.
 * Pieces without sides (a Möbius strip) and edges with more than two faces stay contradictory.
 */
export function facesToTurn(cage: Cage): Int32Array {
  const { mesh, defects } = buildTopology(cage);
  const turned = new Uint8Array(mesh.faces);
  if (defects.turned.length > 0) for (const face of findTurnedFaces(mesh).faces) turned[face] = 1;
  const oneWay = turned.includes(1) ? reversed(cage, turned) : cage;
  for (const face of inwardFaces(oneWay, oneWay === cage ? mesh : buildTopology(oneWay).mesh)) turned[face] ^= 1;
  return Int32Array.from(turned.keys()).filter((face) => turned[face] === 1);
}

/** The cage with the faces of `facesToTurn` reversed; positions, tags and the order of faces stay. A pure function: the given cage is left as it is. */
export function orientFaces(cage: Cage): { cage: Cage; turned: Int32Array } {
  const turned = facesToTurn(cage);
  if (turned.length === 0) return { cage, turned };
  const marks = new Uint8Array(cage.faceStarts.length - 1);
  for (const face of turned) marks[face] = 1;
  return { cage: reversed(cage, marks), turned };
}

/** The marked faces (1) run the other way round, from the same corner on. */
function reversed(cage: Cage, marks: Uint8Array): Cage {
  return rebuildFaces(cage, Array.from(marks.keys()), (face) => {
    const corners = Array.from(cage.faceVertices.subarray(cage.faceStarts[face], cage.faceStarts[face + 1]));
    return marks[face] === 1 ? [corners[0], ...corners.slice(1).reverse()] : corners;
  });
}

/** Faces of the closed pieces that enclose negative volume and lie inside no other piece. */
function inwardFaces(cage: Cage, mesh: Topology): number[] {
  const bodies = partitionFaces(cage, mesh, 'piece');
  const open = new Uint8Array(bodies.pieces);
  for (let h = 0; h < mesh.twin.length; h++) if (mesh.twin[h] < 0) open[bodies.pieceOf[mesh.faceOf[h]]] = 1;
  const volumes = cageVolumes(mesh, cage.positions, bodies.pieceOf, bodies.pieces);
  if (!volumes.some((volume, piece) => volume < 0 && open[piece] === 0)) return [];
  const skipped = Uint8Array.from(bodies.pieceOf, (piece) => open[piece]);
  const inner = new Set(relatePieces(mesh, cage.positions, bodies, skipped, AS_CAGE).insides.map((inside) => inside.inner));
  return Array.from(bodies.pieceOf.keys()).filter((face) => {
    const piece = bodies.pieceOf[face];
    return volumes[piece] < 0 && open[piece] === 0 && !inner.has(piece);
  });
}
