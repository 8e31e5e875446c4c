import { ROW_NODES, rowRule, SHORT_ROW } from '../moments/row-rule';
import { emptyShells, type ShellBody } from '../shell/shell-sums';
import { SHELL_TOLERANCE, type ShellVisitor } from '../shell/shell-visitor';
import type { TriangleRow } from './loop-strip';

const NET = 36;

/** Adds the shell integrals of a long row of triangles of area `area` by a few of them; halved, as for areas, where two rules differ by more than SHELL_TOLERANCE. */
export function addRowShell(visitor: ShellVisitor, body: number, row: TriangleRow, area: number): void {
  const shell = visitor.shells[body];
  // The ends have a say in the largest curvature alone.
  weighPieces(visitor, body, row, [0, row.count - 1], [0, 0], shell);
  addRange(visitor, body, row, 0, row.count, area / row.count, shell);
}

function addRange(visitor: ShellVisitor, body: number, row: TriangleRow, from: number, count: number, areaEach: number, shell: ShellBody): void {
  if (count <= SHORT_ROW) {
    weighPieces(visitor, body, row, Array.from({ length: count }, (_, i) => from + i), new Array<number>(count).fill(1), shell);
    return;
  }
  const [fine, coarse] = ROW_NODES.map((nodes) => {
    const [sums] = emptyShells(1);
    const rule = rowRule(nodes, count);
    weighPieces(visitor, body, row, Array.from(rule.nodes, (node) => from + node), rule.weights, sums);
    return sums;
  });
  const area = areaEach * count;
  // Of ∫ 2H dA a length, of ∫ K dA a number that is small where walls are thinner than the surface's radius.
  const bend = Math.abs(fine.terms[0]) + Math.sqrt(area);
  const bends = [area, bend, (bend * bend) / area];
  const error = Math.max(Math.abs(fine.terms[0] - coarse.terms[0]) / bends[1], Math.abs(fine.terms[1] - coarse.terms[1]) / bends[2]);
  if (!(error <= SHELL_TOLERANCE)) {
    const half = count >> 1;
    addRange(visitor, body, row, from, half, areaEach, shell);
    addRange(visitor, body, row, from + half, count - half, areaEach, shell);
    return;
  }
  for (let i = 0; i < fine.terms.length; i++) shell.terms[i] += fine.terms[i];
  for (let i = 0; i < 3; i++) shell.errors[i] += fine.errors[i] + error * bends[i];
  for (const { peak } of [fine, coarse]) if (peak.curvature > shell.peak.curvature) Object.assign(shell.peak, peak);
}

/** Adds the terms of the pieces at the places `at` by their weights. */
function weighPieces(visitor: ShellVisitor, body: number, row: TriangleRow, at: readonly number[], weights: ArrayLike<number>, shell: ShellBody): void {
  const nets = new Float64Array(NET * row.pieces * at.length);
  at.forEach((i, k) => row.fill(i, nets.subarray(NET * row.pieces * k)));
  visitor.weigh(body, nets, Float64Array.from({ length: row.pieces * at.length }, (_, patch) => weights[Math.floor(patch / row.pieces)]), shell);
}
