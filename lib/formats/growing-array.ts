/** A typed array that doubles as it fills; `take` hands out exactly what was pushed. */
class GrowingArray<T extends Float64Array | Float32Array | Uint32Array | Int32Array> {
  length = 0;

  constructor(
    private items: T,
    private readonly allocate: (length: number) => T,
  ) {}

  push(value: number): void {
    if (this.length === this.items.length) {
      const wider = this.allocate(this.items.length * 2);
      wider.set(this.items);
      this.items = wider;
    }
    this.items[this.length++] = value;
  }

  at(index: number): number {
    return this.items[index];
  }

  /** A copy of the right length, so that the slack is freed. */
  take(): T {
    const exact = this.allocate(this.length);
    exact.set(this.items.subarray(0, this.length));
    return exact;
  }
}

const FIRST_LENGTH = 1024;

type GrowingFloat64 = GrowingArray<Float64Array>;
type GrowingFloat32 = GrowingArray<Float32Array>;
type GrowingUint32 = GrowingArray<Uint32Array>;
type GrowingInt32 = GrowingArray<Int32Array>;

export function growingFloat64(): GrowingFloat64 {
  return new GrowingArray<Float64Array>(new Float64Array(FIRST_LENGTH), (length) => new Float64Array(length));
}

export function growingFloat32(): GrowingFloat32 {
  return new GrowingArray<Float32Array>(new Float32Array(FIRST_LENGTH), (length) => new Float32Array(length));
}

export function growingUint32(): GrowingUint32 {
  return new GrowingArray<Uint32Array>(new Uint32Array(FIRST_LENGTH), (length) => new Uint32Array(length));
}

export function growingInt32(): GrowingInt32 {
  return new GrowingArray<Int32Array>(new Int32Array(FIRST_LENGTH), (length) => new Int32Array(length));
}
