import type { CageDraft } from './cage-draft';
import { crossFrame } from './rings';
import { add, mix, subtract, times, unit, type Vec } from './vector';

/** Corners of a block: bottom then top, each counter-clockwise seen from above. */
export type BlockCorners = readonly [Vec, Vec, Vec, Vec, Vec, Vec, Vec, Vec];

/** A block with eight corners whose edges are rounded by holding loops at the share `inset` of each side. */
export function layBlock(draft: CageDraft, part: string, corners: BlockCorners, inset = 0.12): void {
  const steps = [0, inset, 1 - inset, 1];
  const place = (u: number, v: number, w: number): Vec => {
    const floor = mix(mix(corners[0], corners[1], u), mix(corners[3], corners[2], u), v);
    const roof = mix(mix(corners[4], corners[5], u), mix(corners[7], corners[6], u), v);
    return mix(floor, roof, w);
  };
  const known = new Map<number, number>();
  const vertex = (i: number, j: number, k: number): number => {
    const key = i * 16 + j * 4 + k;
    const held = known.get(key) ?? draft.add(place(steps[i], steps[j], steps[k]));
    known.set(key, held);
    return held;
  };
  for (let a = 0; a < 3; a++) {
    for (let b = 0; b < 3; b++) {
      draft.face(part, vertex(a, b, 0), vertex(a, b + 1, 0), vertex(a + 1, b + 1, 0), vertex(a + 1, b, 0));
      draft.face(part, vertex(a, b, 3), vertex(a + 1, b, 3), vertex(a + 1, b + 1, 3), vertex(a, b + 1, 3));
      draft.face(part, vertex(a, 0, b), vertex(a + 1, 0, b), vertex(a + 1, 0, b + 1), vertex(a, 0, b + 1));
      draft.face(part, vertex(a, 3, b), vertex(a, 3, b + 1), vertex(a + 1, 3, b + 1), vertex(a + 1, 3, b));
      draft.face(part, vertex(0, a, b), vertex(0, a, b + 1), vertex(0, a + 1, b + 1), vertex(0, a + 1, b));
      draft.face(part, vertex(3, a, b), vertex(3, a + 1, b), vertex(3, a + 1, b + 1), vertex(3, a, b + 1));
    }
  }
}

/** An upright block from its middle and size. */
export function layBox(draft: CageDraft, part: string, middle: Vec, size: Vec, inset = 0.12): void {
  const [x, y, z] = times(size, 0.5);
  const at = (sx: number, sy: number, sz: number): Vec => add(middle, [sx * x, sy * y, sz * z]);
  layBlock(draft, part, [at(-1, -1, 1), at(1, -1, 1), at(1, -1, -1), at(-1, -1, -1), at(-1, 1, 1), at(1, 1, 1), at(1, 1, -1), at(-1, 1, -1)], inset);
}

/** A sharp-edged plank: its limit surface is the box itself. */
export function layPlank(draft: CageDraft, part: string, corners: BlockCorners): void {
  const v = corners.map((corner) => draft.add(corner));
  draft.face(part, v[0], v[3], v[2], v[1]);
  draft.face(part, v[4], v[5], v[6], v[7]);
  for (let i = 0; i < 4; i++) {
    const next = (i + 1) % 4;
    draft.face(part, v[i], v[next], v[4 + next], v[4 + i]);
    draft.sharpen(v[i], v[4 + i]);
  }
  draft.sharpenRing(v.slice(0, 4));
  draft.sharpenRing(v.slice(4));
}

/** A four-cornered bar between two points, sharp all round; `across` is the direction of its first side. */
export function layBar(draft: CageDraft, part: string, from: Vec, to: Vec, across: Vec, size: readonly [number, number]): void {
  const [e1, e2] = crossFrame(unit(subtract(to, from)), across);
  const at = (end: Vec, s: number, t: number): Vec => add(end, add(times(e1, (s * size[0]) / 2), times(e2, (t * size[1]) / 2)));
  layPlank(draft, part, [at(from, -1, -1), at(from, 1, -1), at(from, 1, 1), at(from, -1, 1), at(to, -1, -1), at(to, 1, -1), at(to, 1, 1), at(to, -1, 1)]);
}
