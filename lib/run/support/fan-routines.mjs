// AssemblyScript of what fans do between patches, in the memory of the kernels: as lib/engine/kernel/scalar-fans.ts does it, in the same order.
export const FAN_ROUTINES = `
export function refineFans(fans: i32, stride: i32, rows: i32, starts: i32, columns: i32, factors: i32, source: i32, target: i32): void {
  for (let fan: i32 = 0; fan < fans; fan++) {
    let to = target;
    let i: i32 = 0;
    for (let row: i32 = 1; row <= rows; row++) {
      const end = load<i32>(starts + (row << 2));
      let xy: v128 = f64x2.splat(0);
      let z: f64 = 0;
      for (; i < end; i++) {
        const factor = load<f64>(factors + (i << 3));
        const point = source + (load<i32>(columns + (i << 2)) << 3);
        xy = f64x2.add(xy, f64x2.mul(f64x2.splat(factor), v128.load(point)));
        z += factor * load<f64>(point + 16);
      }
      v128.store(to, xy);
      store<f64>(to + 16, z);
      to += 24;
    }
    source += stride;
    target += stride;
  }
}

export function gatherFans(first: i32, patches: i32, perFan: i32, points: i32, nets: i32, state: i32, stride: i32, input: i32, pairStride: i32): void {
  for (let i: i32 = 0; i < patches; i++) {
    const fan = (first + i) / perFan;
    const list = nets + (((first + i - fan * perFan) * points) << 2);
    const base = state + fan * stride;
    let to = input + (i >> 1) * pairStride + ((i & 1) << 3);
    for (let k: i32 = 0; k < points; k++) {
      const from = base + (load<i32>(list + (k << 2)) << 3);
      store<f64>(to, load<f64>(from));
      store<f64>(to + 16, load<f64>(from + 8));
      store<f64>(to + 32, load<f64>(from + 16));
      to += 48;
    }
    store<f64>(to, 0);
    store<f64>(to + 16, 0);
    store<f64>(to + 32, 0);
  }
}

export function sumFans(first: i32, patches: i32, perFan: i32, results: i32, output: i32, pairStride: i32, sums: i32): void {
  for (let i: i32 = 0; i < patches; i++) {
    const to = sums + ((((first + i) / perFan) * results) << 3);
    const from = output + (i >> 1) * pairStride + ((i & 1) << 3);
    for (let k: i32 = 0; k < results; k++) store<f64>(to + (k << 3), load<f64>(to + (k << 3)) + load<f64>(from + (k << 4)));
  }
}
`;
