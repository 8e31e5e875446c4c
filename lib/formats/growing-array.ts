type Numbers = Float64Array | Float32Array | Uint32Array | Int32Array;

/** Numbers in the first piece, and in the longest one. */
const FIRST_LENGTH = 1024;
const MOST_LENGTH = 2 ** 17;

/**
 * A typed array that grows piece by piece, so that growing copies nothing; `take` joins the pieces once. Whoever writes many numbers may write them
 * into `piece` from `used` on, after asking for room, and move `used` behind them.
 */
class GrowingArray<T extends Numbers> {
  piece: T;
  used = 0;
  private readonly full: T[] = [];
  private before = 0;

  constructor(private readonly allocate: (length: number) => T) {
    this.piece = allocate(FIRST_LENGTH);
  }

  get length(): number {
    return this.before + this.used;
  }

  push(value: number): void {
    if (this.used === this.piece.length) this.extend(1);
    this.piece[this.used++] = value;
  }

  /** Makes room for `count` numbers in one piece. */
  reserve(count: number): void {
    if (this.used + count > this.piece.length) this.extend(count);
  }

  private extend(count: number): void {
    const { piece, used } = this;
    if (used > 0) this.full.push(piece.subarray(0, used) as T);
    this.before += used;
    this.piece = this.allocate(Math.max(count, Math.min(MOST_LENGTH, 2 * piece.length)));
    this.used = 0;
  }

  /** All numbers in an array of just the right length; to be asked once, when nothing more is to come, since the pieces are let go of. `length` stays. */
  take(): T {
    const whole = this.allocate(this.length);
    let at = 0;
    for (const piece of this.full) {
      whole.set(piece, at);
      at += piece.length;
    }
    whole.set(this.piece.subarray(0, this.used), at);
    this.full.length = 0;
    this.before += this.used;
    this.used = 0;
    this.piece = this.allocate(0);
    return whole;
  }
}

type GrowingFloat64 = GrowingArray<Float64Array>;
type GrowingFloat32 = GrowingArray<Float32Array>;
type GrowingUint32 = GrowingArray<Uint32Array>;
type GrowingInt32 = GrowingArray<Int32Array>;

export function growingFloat64(): GrowingFloat64 {
  return new GrowingArray<Float64Array>((length) => new Float64Array(length));
}

export function growingFloat32(): GrowingFloat32 {
  return new GrowingArray<Float32Array>((length) => new Float32Array(length));
}

export function growingUint32(): GrowingUint32 {
  return new GrowingArray<Uint32Array>((length) => new Uint32Array(length));
}

export function growingInt32(): GrowingInt32 {
  return new GrowingArray<Int32Array>((length) => new Int32Array(length));
}
