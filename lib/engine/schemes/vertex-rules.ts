import type { VertexStars } from './catmull-clark-masks';
import type { LevelMesh } from './level-mesh';
import { decayed } from './sharpness-decay';

const SMOOTH = 0;
const CREASE = 2;
const CORNER = 3;

/** Corner: tagged, or more than two sharp edges; crease: two; one (a dart) and none: smooth. */
function ruleOf(vertexSharpness: number, sharpEdges: number): number {
  if (vertexSharpness > 0 || sharpEdges > 2) return CORNER;
  return sharpEdges === 2 ? CREASE : SMOOTH;
}

/**
 * One coordinate of a vertex point, `smooth` being the scheme's smooth rule. Where the rule changes in this step, the old rule counts by the mean w of the
 * sharpnesses that end in it (at most 1) and the new one by 1 − w; a smooth vertex or dart is never blended.
 */
export function blendVertexRules(mesh: LevelMesh, vertex: number, stars: VertexStars, axis: number, smooth: (axis: number) => number): number {
  const sharpness = mesh.vertexSharpness[vertex];
  const childSharpness = decayed(sharpness);
  const parent = ruleOf(sharpness, stars.sharp[vertex]);
  const child = ruleOf(childSharpness, stars.childSharp[vertex]);
  const byRule = (rule: number, sharpSums: Float64Array): number => {
    const own = mesh.positions[3 * vertex + axis];
    if (rule === CORNER) return own;
    return rule === CREASE ? (6 * own + sharpSums[3 * vertex + axis]) / 8 : smooth(axis);
  };
  const before = byRule(parent, stars.sharpSums);
  if (parent === SMOOTH || parent === child) return before;
  const ends = sharpness > 0 && childSharpness === 0;
  const count = stars.endings[vertex] + (ends ? 1 : 0);
  const weight = count === 0 ? 0 : Math.min(1, (stars.endingSums[vertex] + (ends ? sharpness : 0)) / count);
  return weight * before + (1 - weight) * byRule(child, stars.childSharpSums);
}
