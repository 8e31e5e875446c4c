import { RegularPatches } from '../kernel/regular-patches';
import type { BorderCurves } from '../moments/border-curves';
import type { LimitSums } from '../moments/limit-sums';
import { classifyVertices, isRegularFace, TRIANGLE_COUNTS } from './classify-vertices';
import { FanBatches } from './fan-batches';
import { levelMesh, type LevelMesh } from './level-mesh';
import { addTriangleSide, LOOP_KIT } from './loop-kit';
import { fillTriangleNet } from './loop-net';
import { refineTriangles } from './loop-refine';
import { RowPatches } from './loop-row';
import { splitTriangleStrip, triangleStripSide } from './loop-strip';
import { finishLevels, nearOwn, OWN } from './refinement-blocks';
import type { RefinementRules } from './refinement-rules';
import { settleFans } from './settle-fans';

/** Refinements after which a cage that still is not resolved is given up; sharpness below 10 needs at most 12. */
const MOST_LEVELS = 16;

const NO_SHIFT = new Float64Array(3);
const net = new Float64Array(36);

/**
 * Integrates the Loop limit surface of the live faces of `cage`, all triangles, about the bodies' origins. Regular triangles are exact quartic box splines,
 * extraordinary fans closed level sequences; triangles along a crease of one semi-sharp sharpness are split where they lie, the rest is refined locally.
 * Returns false where the cage could not be resolved.
 */
export function integrateLoop(cage: LevelMesh, rules: RefinementRules, origins: Float64Array, sums: LimitSums): boolean {
  const patches = new RegularPatches('triangle', origins, sums);
  const rows = new RowPatches(origins, sums);
  const batches = new FanBatches(LOOP_KIT, origins, sums);
  const finish = (mesh: LevelMesh): { left: number; live: Uint8Array } => {
    const { live } = mesh;
    const { kinds, fans } = classifyVertices(mesh, TRIANGLE_COUNTS);
    let left = 0;
    for (let face = 0; face < mesh.faces; face++) {
      if (live[face] === 0) continue;
      const regular = isRegularFace(mesh, TRIANGLE_COUNTS, kinds, face, -1);
      const side = regular ? mesh.starts[face] : triangleStripSide(mesh, kinds, face);
      if (side < 0) {
        if (live[face] === OWN) left++;
        continue;
      }
      if (live[face] === OWN) {
        if (regular) addRegularTriangle(mesh, face, patches, sums.curves);
        else addStrip(mesh, side, rules, patches, rows, sums.curves);
      }
      live[face] = 0;
    }
    patches.flush();
    return { left: settleFans(mesh, TRIANGLE_COUNTS, kinds, fans, left, batches), live };
  };
  const refine = (mesh: LevelMesh, live: Uint8Array): LevelMesh => refineTriangles(levelMesh({ ...mesh, live: nearOwn(mesh, live) }), rules);
  return finishLevels(cage, { elements: 'faces', mostLevels: MOST_LEVELS, finish, refine });
}

function addRegularTriangle(mesh: LevelMesh, face: number, patches: RegularPatches, curves: BorderCurves): void {
  const start = mesh.starts[face];
  fillTriangleNet(mesh, start, net);
  patches.add(mesh.bodyOf[face], net);
  for (let side = 0; side < 3; side++) addBorder(mesh, start + side, net, side, 0, 1, curves);
}

/** `first` is the strip's side along the crease. */
function addStrip(mesh: LevelMesh, first: number, rules: RefinementRules, patches: RegularPatches, rows: RowPatches, curves: BorderCurves): void {
  const face = mesh.faceOf[first];
  const body = mesh.bodyOf[face];
  const edges = [0, 1, 2].map((i) => mesh.starts[face] + ((first - mesh.starts[face] + i) % 3));
  splitTriangleStrip(mesh, first, rules.creasing, {
    piece: (piece) => patches.add(body, piece),
    row: (row) => rows.add(body, row, patches),
    side: (piece, side, from, share, weight, doubt) => addBorder(mesh, edges[side], piece, side, from, share, curves, weight, doubt),
  });
}

/** Adds side `side` of a net where it is a piece of a border: of half-edge `h` the share `share`, `from` its start. It counts `weight` times, give or take `doubt` of that. */
function addBorder(
  mesh: LevelMesh, h: number, values: Float64Array, side: number, from: number, share: number, curves: BorderCurves, weight = 1, doubt = 0,
): void {
  const edge = mesh.borderOf[h];
  if (edge < 0) return;
  const length = 2 ** -mesh.level;
  const first = curves.edges.length;
  addTriangleSide(curves, values, side, edge, weight, mesh.borderFrom[h] + from * length, share * length, NO_SHIFT);
  if (doubt > 0) curves.doubtFrom(first, weight * doubt);
}
