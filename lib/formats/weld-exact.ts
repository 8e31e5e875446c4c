/** Vertices of which equal ones were made one. */
export interface Welded {
  /** x, y, z of each vertex that stays, in the order of first use. */
  positions: Float64Array;
  /** For each vertex given, its number among those. */
  into: Uint32Array;
}

/**
 * Makes one vertex of those with the very same coordinates (−0 counts as 0), for formats that repeat a vertex with every triangle.
 * Nothing is moved: vertices that are near and not equal stay apart. Found through a table of open addressing.
 */
export function weldExact(given: Float64Array): Welded {
  const count = given.length / 3;
  const into = new Uint32Array(count);
  const slots = 2 ** Math.ceil(Math.log2(2 * count + 2));
  const table = new Int32Array(slots).fill(-1);
  const kept = new Float64Array(given.length);
  const triple = new Float64Array(3);
  const words = new Uint32Array(triple.buffer);
  let vertices = 0;
  for (let i = 0; i < count; i++) {
    const x = (triple[0] = given[3 * i] + 0);
    const y = (triple[1] = given[3 * i + 1] + 0);
    const z = (triple[2] = given[3 * i + 2] + 0);
    let hash = 0x811c9dc5;
    for (let w = 0; w < 6; w++) hash = Math.imul(hash ^ words[w], 0x01000193) ^ (hash >>> 15);
    let slot = (hash ^ (hash >>> 13)) & (slots - 1);
    for (; table[slot] >= 0; slot = (slot + 1) & (slots - 1)) {
      const at = 3 * table[slot];
      if (kept[at] === x && kept[at + 1] === y && kept[at + 2] === z) break;
    }
    if (table[slot] < 0) {
      table[slot] = vertices;
      kept.set(triple, 3 * vertices++);
    }
    into[i] = table[slot];
  }
  return { positions: kept.slice(0, 3 * vertices), into };
}
