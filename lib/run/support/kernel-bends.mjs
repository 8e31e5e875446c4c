// How much X_u × X_v turns and stretches over a patch: where it is looked at, and the measure that the moments' kernels leave beside a patch's areas.
import { pruned } from './kernel-dialects.mjs';
import { AXES, middle, normal, side } from './kernel-shapes.mjs';

const HEADS = /^let (u|wu|rest|v|w) =/;
/** A line's or pair's operations without the node that they are for. */
export const headless = (list) => list.filter((text) => !HEADS.test(text));

/** Where it is looked at: a line's two ends, or its middle; first the middle of the patch, then its corners. */
export const looksOf = (shape) => shape.name === 'triangle' ? [['0 - 1 / 6', null], ['0 - 1 / 2', '1 / 2'], ['1 / 2', null]] : [['0', null], ['0 - 1 / 2', '1 / 2'], ['1 / 2', '1 / 2']];

/** Operations that leave the square of the most that X_u × X_v differs at a corner from the middle, relative to its length there, in `bends[0]`, a block each. */
export function variationOf(shape) {
  const [first, ...others] = looksOf(shape);
  const atMiddle = headless(middle(false));
  const lineAt = (u) => [`let u = ${u}`, ...headless(shape.line(false))];
  const square = (t) => {
    const parts = AXES.map((axis) => `(n${axis}${t} - n${axis}c) * (n${axis}${t} - n${axis}c)`);
    return parts.join(' + ');
  };
  const whole = [...lineAt(first[0]), ...atMiddle, ...normal('m'), ...AXES.map((axis) => `let n${axis}c = n${axis}m`)];
  const corner = ([u, v]) => v === null
    ? [...lineAt(u), ...atMiddle, ...normal('m'), `most max= ${square('m')}`]
    : [...lineAt(u), `let v = ${v}`, ...headless(shape.pair(false)), ...side('l', '+', false), ...side('r', '-', false), ...normal('l'), ...normal('r'), `most max= ${square('l')}`, `most max= ${square('r')}`];
  return {
    middle: pruned([...whole, ...AXES.map((axis) => `most max= n${axis}c`)]).slice(0, -AXES.length),
    corners: others.map((look) => pruned(corner(look))),
    last: [`bends[0] := most / (${AXES.map((axis) => `n${axis}c * n${axis}c`).join(' + ')})`],
  };
}
