import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import type { BorderCurves } from '../moments/border-curves';
import { collectRing } from './classify-vertices';
import { cageEdge, runsOutwards, type DooSabinMesh } from './doo-sabin-mesh';
import type { Offspring } from './doo-sabin-refine';

/** Hands the border curves of `mesh` over to the sides of the refined mesh's patches: each piece falls into two. */
export function addBorderCurves(mesh: DooSabinMesh, at: Offspring, keptCorners: readonly number[], firstCorner: number, fine: DooSabinMesh): void {
  const set = (h: number, curve: number, from: number): void => {
    if (h < 0) return;
    fine.borderOf[h] = curve;
    fine.borderFrom[h] = from;
  };
  const half = 2 ** -(mesh.level + 1);
  for (const h of at.active) {
    const curve = mesh.borderOf[h];
    const t = mesh.twin[h];
    if (curve < 0) continue;
    const from = mesh.borderFrom[h];
    const quad = at.inEdge[t >= 0 && t < h ? t : h];
    if (quad < 0) continue;
    if (t < 0) {
      if (mesh.level === 0) continue;
      // A spoke: its outer half between the two new vertices of the border, its inner one between those of the face.
      const outwards = runsOutwards(mesh, curve);
      set(quad + 2, curve, outwards ? from + half : from);
      if (outwards) set(quad, curve, from);
      else set(at.inFace[h], curve, from + half);
      continue;
    }
    const lower = h < t;
    if (mesh.level === 0) {
      // From the face of the edge's start to its quad, and on to the face of its end.
      set(lower ? quad + 3 : quad + 1, curve, 0);
      set(at.inVertex[nextHalfEdge(mesh, h)], curve, half);
    } else {
      set(lower ? quad : quad + 2, curve, from);
      set(at.inFace[h], curve, from + half);
    }
  }
  addRims(mesh, at, keptCorners, firstCorner, fine);
  if (mesh.level === 0) addSpokes(mesh, at, fine);
}

/** Which stretch of the border each new border vertex' patch ends in. */
function addRims(mesh: DooSabinMesh, { active, rimIds }: Offspring, keptCorners: readonly number[], firstCorner: number, fine: DooSabinMesh): void {
  const set = (id: number, edge: number, from: number, share: number): void => {
    fine.rimOf[id] = edge;
    fine.rimFrom[id] = from;
    fine.rimShare[id] = share;
  };
  if (mesh.level > 0) {
    for (const h of active) {
      if (rimIds[h] < 0) continue;
      const after = nextHalfEdge(mesh, h);
      const a = mesh.vertexOf[h];
      const b = mesh.vertexOf[after];
      const [half, rest] = [mesh.rimShare[a] / 2, mesh.rimShare[b] / 2];
      set(rimIds[h], mesh.rimOf[a], mesh.rimFrom[a] + half, half);
      // A kept corner's own entry is that of the edge that leaves it; towards it runs the edge of the vertex before.
      if (mesh.twin[after] < 0) set(rimIds[h] + 1, mesh.rimOf[a], 1 - 2 * rest, rest);
      else set(rimIds[h] + 1, mesh.rimOf[b], mesh.rimFrom[b], rest);
    }
    keptCorners.forEach((h, i) => set(firstCorner + i, mesh.rimOf[mesh.vertexOf[h]], 0, mesh.rimShare[mesh.vertexOf[h]] / 2));
    return;
  }
  for (const h of active) {
    if (rimIds[h] < 0) continue;
    set(rimIds[h], cageEdge(mesh, h), 0, 0.5);
    set(rimIds[h] + 1, cageEdge(mesh, h), 0.5, 0.5);
  }
  keptCorners.forEach((h, i) => {
    const before = previousHalfEdge(mesh, h);
    set(firstCorner + i, cageEdge(mesh, h), 0, 0.25);
    set(rimIds[h], cageEdge(mesh, h), 0.25, 0.25);
    set(rimIds[before] + 1, cageEdge(mesh, before), 0.5, 0.25);
  });
}

/** The rings, from the border on, of the cage's border vertices where bodies meet. */
function spokeRings(mesh: DooSabinMesh): number[][] {
  const rings: number[][] = [];
  for (let h = 0; h < mesh.twin.length; h++) {
    if (mesh.twin[h] >= 0) continue;
    const ring: number[] = [];
    collectRing(mesh, h, ring);
    if (ring.some((corner, i) => i > 0 && (mesh.borderOf[corner] >= 0 || mesh.borderOf[mesh.twin[corner]] >= 0))) rings.push(ring);
  }
  return rings;
}

function addSpokes(mesh: DooSabinMesh, at: Offspring, fine: DooSabinMesh): void {
  for (const ring of spokeRings(mesh)) {
    const last = ring[ring.length - 1];
    if (at.closing[ring[0]] < 0) continue;
    const side = fine.starts[fine.faceOf[at.closing[ring[0]]]] + ring.length;
    const inwards = mesh.live[mesh.faceOf[last]] === 1;
    if (!inwards && mesh.live[mesh.faceOf[ring[0]]] === 0) continue;
    fine.borderOf[side] = mesh.firstSpoke + cageEdge(mesh, ring[0]) + (inwards ? 0 : mesh.spokes);
    fine.borderFrom[side] = inwards ? 0.5 : 0;
  }
}

/**
 * Makes the border curves between bodies begin and end at the border: each that ends in the middle of a border vertex' face is led on along its spoke.
 * Bodies that touch the border in that vertex only walk the spoke both ways, which adds nothing.
 */
export function joinSpokes(cage: DooSabinMesh, curves: BorderCurves): void {
  const rings = new Map(spokeRings(cage).map((ring) => [ring[0], ring]));
  if (rings.size === 0) return;
  const pieces = curves.edges.length;
  for (let piece = 0; piece < pieces; piece++) {
    const spoke = curves.edges[piece];
    if (spoke < cage.firstSpoke) continue;
    const ring = rings.get((spoke - cage.firstSpoke) % cage.spokes);
    if (ring === undefined) continue;
    const edgeBefore = previousHalfEdge(cage, ring[ring.length - 1]);
    const end = curves.ends.get(2 * ring[0]) ?? curves.ends.get(2 * edgeBefore + 1);
    for (let i = 1; i < ring.length; i++) {
      const leaving = cage.borderOf[ring[i]];
      const edge = leaving >= 0 ? leaving : cage.borderOf[cage.twin[ring[i]]];
      if (edge < 0) continue;
      const outwards = leaving < 0;
      curves.addCopy(piece, edge, outwards !== runsOutwards(cage, spoke));
      if (end !== undefined) curves.ends.set(2 * edge + (outwards ? 1 : 0), end);
    }
  }
}
