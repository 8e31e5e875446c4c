/** Ten solid and ten surface moments and the magnitude: what is summed of a patch's results. */
export const SUMMED_RESULTS = 21;

/** Doubles that a vector kernel's memory has for fans. */
export const FAN_ROOM = 140_000;

/**
 * What fans do between patches, in a memory of doubles whose places are counted in doubles from its start. A fan's points stand x, y, z one after the other,
 * fans `stride` apart; integers stand in `integers`, two to a double.
 */
export interface FanRoutines {
  memory: Float64Array;
  integers: Int32Array;
  /** Applies a sparse matrix to each fan's points: row i has `factors` [starts[i], starts[i + 1]) at the points that `columns` says (in doubles from the fan's first). */
  refine(fans: number, stride: number, rows: number, starts: number, columns: number, factors: number, source: number, target: number): void;
  /** Puts the nets of patches from `first` on, counted through the fans, into the block, about 0; `nets` has the place of each point within its fan. */
  gather(first: number, patches: number, perFan: number, points: number, nets: number, state: number, stride: number): void;
  /** Adds the results of the block's patches to the sums of their fans, SUMMED_RESULTS each. */
  sum(first: number, patches: number, perFan: number, sums: number): void;
}

/** The routines in JavaScript, in the same order as those of the vector kernel, so to the same bits. `pairStride` and `resultStride` are those of the block's pairs. */
export function scalarFans(memory: Float64Array, input: Float64Array, pairStride: number, output: Float64Array, resultStride: number): FanRoutines {
  const integers = new Int32Array(memory.buffer, memory.byteOffset, 2 * memory.length);
  return {
    memory,
    integers,
    refine(fans, stride, rows, starts, columns, factors, source, target) {
      for (let fan = 0; fan < fans; fan++) {
        let to = target + fan * stride;
        const base = source + fan * stride;
        for (let row = 1, i = 0; row <= rows; row++, to += 3) {
          const end = integers[2 * starts + row];
          let x = 0, y = 0, z = 0;
          for (; i < end; i++) {
            const factor = memory[factors + i];
            const point = base + integers[2 * columns + i];
            x += factor * memory[point];
            y += factor * memory[point + 1];
            z += factor * memory[point + 2];
          }
          memory[to] = x;
          memory[to + 1] = y;
          memory[to + 2] = z;
        }
      }
    },
    gather(first, patches, perFan, points, nets, state, stride) {
      for (let i = 0; i < patches; i++) {
        const fan = Math.floor((first + i) / perFan);
        const list = 2 * nets + (first + i - fan * perFan) * points;
        const base = state + fan * stride;
        let to = (i >> 1) * pairStride + (i & 1);
        for (let k = list; k < list + points; k++, to += 6) {
          const from = base + integers[k];
          input[to] = memory[from];
          input[to + 2] = memory[from + 1];
          input[to + 4] = memory[from + 2];
        }
        input[to] = input[to + 2] = input[to + 4] = 0;
      }
    },
    sum(first, patches, perFan, sums) {
      for (let i = 0; i < patches; i++) {
        const to = sums + SUMMED_RESULTS * Math.floor((first + i) / perFan);
        const from = (i >> 1) * resultStride + (i & 1);
        for (let k = 0; k < SUMMED_RESULTS; k++) memory[to + k] += output[from + 2 * k];
      }
    },
  };
}
