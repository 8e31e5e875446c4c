/** Items in a leaf at most. */
const LEAF = 4;

/** Whether two boxes (min x, y, z, max x, y, z from the given offsets on) have a point in common. */
export function boxesMeet(a: Float64Array, i: number, b: Float64Array, j: number): boolean {
  return a[i] <= b[j + 3] && b[j] <= a[i + 3] && a[i + 1] <= b[j + 4] && b[j + 1] <= a[i + 4] && a[i + 2] <= b[j + 5] && b[j + 2] <= a[i + 5];
}

/** Makes the box at `at` hold nothing. */
export function emptyBox(boxes: Float64Array, at: number): void {
  boxes[at] = boxes[at + 1] = boxes[at + 2] = Infinity;
  boxes[at + 3] = boxes[at + 4] = boxes[at + 5] = -Infinity;
}

/** Enlarges the box at `to` by the one at `from`. */
export function growBox(boxes: Float64Array, to: number, source: Float64Array, from: number): void {
  for (let axis = 0; axis < 3; axis++) {
    if (source[from + axis] < boxes[to + axis]) boxes[to + axis] = source[from + axis];
    if (source[from + 3 + axis] > boxes[to + 3 + axis]) boxes[to + 3 + axis] = source[from + 3 + axis];
  }
}

/** A binary tree of bounding boxes over some items, split at the median of the longest side. */
export class BoxTree {
  /** Box of each node. */
  readonly boxes: Float64Array;
  /** Items of node n: `items[firsts[n] .. ends[n])`. */
  readonly firsts: Int32Array;
  readonly ends: Int32Array;
  /** Second child of a node, the first one being n + 1; 0 for a leaf. */
  readonly second: Int32Array;
  private nodes = 0;

  /** `itemBoxes` has six numbers per item number; `items` lists the ones to hold and is reordered. There must be one at least. */
  constructor(readonly itemBoxes: Float64Array, readonly items: Int32Array) {
    const most = Math.max(1, items.length);
    this.boxes = new Float64Array(12 * most);
    this.firsts = new Int32Array(2 * most);
    this.ends = new Int32Array(2 * most);
    this.second = new Int32Array(2 * most);
    this.build(0, items.length);
  }

  private build(from: number, to: number): number {
    const node = this.nodes++;
    const at = 6 * node;
    this.firsts[node] = from;
    this.ends[node] = to;
    emptyBox(this.boxes, at);
    for (let i = from; i < to; i++) growBox(this.boxes, at, this.itemBoxes, 6 * this.items[i]);
    if (to - from <= LEAF) return node;
    let axis = 0;
    for (let other = 1; other < 3; other++) if (this.boxes[at + 3 + other] - this.boxes[at + other] > this.boxes[at + 3 + axis] - this.boxes[at + axis]) axis = other;
    const middle = (from + to) >> 1;
    this.select(from, to - 1, middle, axis);
    this.build(from, middle);
    this.second[node] = this.build(middle, to);
    return node;
  }

  /** Reorders so that what comes before `middle` lies no further along the axis than what comes after [Hoare 1961]. */
  private select(from: number, to: number, middle: number, axis: number): void {
    const { items, itemBoxes } = this;
    const key = (item: number): number => itemBoxes[6 * item + axis] + itemBoxes[6 * item + 3 + axis];
    while (from < to) {
      const pivot = key(items[middle]);
      let i = from;
      let j = to;
      while (i <= j) {
        while (key(items[i]) < pivot) i++;
        while (key(items[j]) > pivot) j--;
        if (i > j) break;
        const item = items[i];
        items[i++] = items[j];
        items[j--] = item;
      }
      if (j < middle) from = i;
      if (middle < i) to = j;
    }
  }

  /** Calls `visit` for each item whose box meets the given one. */
  eachMeeting(box: Float64Array, visit: (item: number) => void, node = 0): void {
    if (!boxesMeet(this.boxes, 6 * node, box, 0)) return;
    if (this.second[node] > 0) {
      this.eachMeeting(box, visit, node + 1);
      this.eachMeeting(box, visit, this.second[node]);
      return;
    }
    for (let i = this.firsts[node]; i < this.ends[node]; i++) if (boxesMeet(this.itemBoxes, 6 * this.items[i], box, 0)) visit(this.items[i]);
  }
}

/** Calls `visit` for each pair of items of two trees whose boxes meet, until it answers false. Answers false then. */
export function eachMeetingPair(a: BoxTree, b: BoxTree, visit: (itemA: number, itemB: number) => boolean, nodeA = 0, nodeB = 0): boolean {
  if (!boxesMeet(a.boxes, 6 * nodeA, b.boxes, 6 * nodeB)) return true;
  const leafA = a.second[nodeA] === 0;
  const leafB = b.second[nodeB] === 0;
  if (leafA && leafB) {
    for (let i = a.firsts[nodeA]; i < a.ends[nodeA]; i++) {
      for (let j = b.firsts[nodeB]; j < b.ends[nodeB]; j++) {
        if (boxesMeet(a.itemBoxes, 6 * a.items[i], b.itemBoxes, 6 * b.items[j]) && !visit(a.items[i], b.items[j])) return false;
      }
    }
    return true;
  }
  const splitA = !leafA && (leafB || a.ends[nodeA] - a.firsts[nodeA] >= b.ends[nodeB] - b.firsts[nodeB]);
  return splitA
    ? eachMeetingPair(a, b, visit, nodeA + 1, nodeB) && eachMeetingPair(a, b, visit, a.second[nodeA], nodeB)
    : eachMeetingPair(a, b, visit, nodeA, nodeB + 1) && eachMeetingPair(a, b, visit, nodeA, b.second[nodeB]);
}
