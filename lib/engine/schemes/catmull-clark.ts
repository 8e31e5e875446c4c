import { RegularPatches } from '../kernel/regular-patches';
import type { BorderCurves } from '../moments/border-curves';
import type { LimitSums } from '../moments/limit-sums';
import { classifyVertices, INNER, isRegularFace, QUAD_COUNTS } from './classify-vertices';
import { CATMULL_CLARK_KIT } from './catmull-clark-kit';
import { fillInnerNet, fillNet } from './catmull-clark-net';
import { refineAround } from './catmull-clark-refine';
import { refineStrip, stripSide } from './crease-strip';
import { FanBatches } from './fan-batches';
import { isSharpForGood, levelMesh, type LevelMesh } from './level-mesh';
import { finishLevels, nearOwn, OWN } from './refinement-blocks';
import type { RefinementRules } from './refinement-rules';
import { settleFans } from './settle-fans';

/** Refinements after which a cage that still is not resolved is given up; sharpness below 10 needs at most 12. */
const MOST_LEVELS = 16;

const NO_SHIFT = new Float64Array(3);
const net = new Float64Array(48);

/**
 * Integrates the Catmull-Clark limit surface of the live faces of `cage` about the bodies' origins (x, y, z each, in the cage's frame).
 * Regular faces are exact bicubics, extraordinary fans closed level sequences; faces along a crease of one semi-sharp sharpness are refined across it only,
 * the rest locally in both directions until nothing is left.
 * Returns false where the cage could not be resolved.
 */
export function integrateCatmullClark(cage: LevelMesh, rules: RefinementRules, origins: Float64Array, sums: LimitSums): boolean {
  const patches = new RegularPatches('bicubic', origins, sums);
  const batches = new FanBatches(CATMULL_CLARK_KIT, origins, sums);
  const finish = (mesh: LevelMesh): { left: number; live: Uint8Array } => {
    const { live } = mesh;
    const { kinds, fans } = classifyVertices(mesh, QUAD_COUNTS);
    let left = 0;
    for (let face = 0; face < mesh.faces; face++) {
      if (live[face] === 0) continue;
      const regular = isRegularFace(mesh, QUAD_COUNTS, kinds, face, -1);
      const side = regular ? mesh.starts[face] : stripSide(mesh, kinds, face);
      if (side < 0) {
        if (live[face] === OWN) left++;
        continue;
      }
      if (live[face] === OWN) {
        if (regular) addRegularFace(mesh, kinds, face, patches, sums.curves);
        else addStrip(mesh, side, rules, patches, sums.curves);
      }
      live[face] = 0;
    }
    patches.flush();
    return { left: settleFans(mesh, QUAD_COUNTS, kinds, fans, left, batches), live };
  };
  const refine = (mesh: LevelMesh, live: Uint8Array): LevelMesh => refineAround(levelMesh({ ...mesh, live: nearOwn(mesh, live) }), rules);
  return finishLevels(cage, { elements: 'faces', mostLevels: MOST_LEVELS, finish, refine });
}

function addRegularFace(mesh: LevelMesh, kinds: Uint8Array, face: number, patches: RegularPatches, curves: BorderCurves): void {
  const start = mesh.starts[face];
  if (isInnerFace(mesh, kinds, start)) {
    fillInnerNet(mesh, face, patches.input, patches.place(mesh.bodyOf[face]));
    return;
  }
  fillNet(mesh, start, false, net);
  patches.add(mesh.bodyOf[face], net);
  for (let side = 0; side < 4; side++) addBorder(mesh, start + side, net, side, 0, 1, curves);
}

/** Whether a regular face has inner corners alone and no side on a border of its body, as most have. */
function isInnerFace({ borderOf }: LevelMesh, kinds: Uint8Array, start: number): boolean {
  for (let h = start; h < start + 4; h++) if (kinds[h] !== INNER || borderOf[h] >= 0) return false;
  return true;
}

/** `first` is the strip's side along the crease. */
function addStrip(mesh: LevelMesh, first: number, rules: RefinementRules, patches: RegularPatches, curves: BorderCurves): void {
  const face = mesh.faceOf[first];
  const sides = [0, 1, 2, 3].map((i) => mesh.starts[face] + ((first - mesh.starts[face] + i) & 3));
  fillNet(mesh, first, false, net);
  const far = isSharpForGood(mesh, sides[2]) ? 0 : mesh.edgeSharpness[sides[2]];
  refineStrip(net, mesh.edgeSharpness[first], far, rules.creasing, (piece, from, share) => {
    patches.add(mesh.bodyOf[face], piece);
    if (from === 0) addBorder(mesh, sides[0], piece, 0, 0, 1, curves);
    addBorder(mesh, sides[1], piece, 1, from, share, curves);
    if (from + share === 1) addBorder(mesh, sides[2], piece, 2, 0, 1, curves);
    addBorder(mesh, sides[3], piece, 3, 1 - from - share, share, curves);
  });
}

/** Adds side `side` of a net where it is a piece of a border: of half-edge `h` the share `share`, `from` its start. */
function addBorder(mesh: LevelMesh, h: number, values: Float64Array, side: number, from: number, share: number, curves: BorderCurves): void {
  const edge = mesh.borderOf[h];
  if (edge < 0) return;
  const length = 2 ** -mesh.level;
  curves.addSide(values, side, edge, 1, mesh.borderFrom[h] + from * length, share * length, NO_SHIFT);
}
