import { MeshError } from './mesh-error';

/** LZ4 makes at most 255 bytes of one. [LZ4 block format, from memory] */
const MOST_RATIO = 255;
const CHUNK_BYTES = 65_536;
const MOST_UNPACKED = 1 << 30;
const MOST_ITEMS = 200_000_000;

/** Reads little-endian numbers and packed blocks from a crate. Every size is held against the bytes that are there before memory is set aside. */
export class CrateBytes {
  private readonly view: DataView;
  /** Offset of the next byte to read. */
  at = 0;
  private unpacked = 0;

  constructor(readonly bytes: Uint8Array) {
    this.view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  }

  seek(offset: number): void {
    if (!(offset >= 0 && offset <= this.bytes.length)) throw this.fail('bad_offset', `an offset within the ${this.bytes.length} bytes of the file`, offset, this.at);
    this.at = offset;
  }

  /** Refuses to read beyond the end. */
  need(size: number): void {
    if (!(size >= 0 && size <= this.bytes.length - this.at)) throw this.fail('truncated', `${size} more bytes`, this.bytes.length - this.at, this.at);
  }

  uint8(): number {
    this.need(1);
    return this.view.getUint8(this.at++);
  }

  uint32(): number {
    this.need(4);
    this.at += 4;
    return this.view.getUint32(this.at - 4, true);
  }

  /** An unsigned 64-bit number that a double holds. */
  uint64(): number {
    const low = this.uint32();
    const value = this.uint32() * 2 ** 32 + low;
    if (!Number.isSafeInteger(value)) throw this.fail('bad_count', 'a number below 2⁵³', value, this.at - 8);
    return value;
  }

  int64(): number {
    const low = this.uint32();
    return (this.uint32() | 0) * 2 ** 32 + low;
  }

  slice(size: number): Uint8Array {
    this.need(size);
    this.at += size;
    return this.bytes.subarray(this.at - size, this.at);
  }

  /** A count of things of which each takes at least `leastBytes` (may be a fraction) of what is left. */
  count(value: number, leastBytes: number, what: string): number {
    const most = Math.floor((this.bytes.length - this.at) / leastBytes);
    if (value > most) throw this.fail('bad_count', `at most ${most} ${what} in the bytes that follow`, value, this.at);
    return value;
  }

  /** Counts what arrays were read so far: many attributes may point to one array, and each would be held. */
  spend(items: number): void {
    this.unpacked += items;
    if (this.unpacked > MOST_ITEMS) throw this.fail('too_large', `at most ${MOST_ITEMS} numbers in all arrays`, 'more', this.at);
  }

  /** Unpacks a block of the next `packed` bytes: its length in chunks, then LZ4. Answers what was unpacked, at most `most` bytes. */
  unpack(packed: number, most: number): Uint8Array {
    const start = this.at;
    const block = this.slice(packed);
    if (most > MOST_UNPACKED || most > MOST_RATIO * packed + CHUNK_BYTES) throw this.fail('bad_count', `at most ${Math.min(MOST_UNPACKED, MOST_RATIO * packed)} bytes unpacked from ${packed}`, most, start);
    if (packed === 0) return new Uint8Array(0);
    const out = new Uint8Array(most);
    const chunks = block[0];
    if (chunks === 0) return out.subarray(0, this.unpackChunk(block, 1, packed, out, 0, most, start));
    if (1 + 4 * chunks > packed) throw this.fail('bad_packing', `sizes of ${chunks} chunks`, packed, start);
    let [from, to] = [1 + 4 * chunks, 0];
    const sizes = new DataView(block.buffer, block.byteOffset, block.byteLength);
    for (let i = 0; i < chunks; i++) {
      const size = sizes.getUint32(1 + 4 * i, true);
      if (size > packed - from) throw this.fail('bad_packing', `a chunk within ${packed} bytes`, size, start);
      to = this.unpackChunk(block, from, from + size, out, to, Math.min(most, to + CHUNK_BYTES), start);
      from += size;
    }
    return out.subarray(0, to);
  }

  /** LZ4's sequences: literals, then a match that may overlap what it makes. */
  private unpackChunk(from: Uint8Array, start: number, end: number, to: Uint8Array, at: number, stop: number, offset: number): number {
    let i = start;
    const broken = (what: string) => this.fail('bad_packing', what, i, offset);
    const length = (nibble: number): number => {
      let total = nibble;
      for (let more = nibble === 15; more; ) {
        if (i >= end) throw broken('a length that ends');
        total += from[i];
        more = from[i++] === 255;
      }
      return total;
    };
    while (i < end) {
      const token = from[i++];
      const literals = length(token >> 4);
      if (literals > end - i || literals > stop - at) throw broken('literals within the block');
      to.set(from.subarray(i, i + literals), at);
      i += literals;
      at += literals;
      if (i >= end) break;
      if (i + 2 > end) throw broken('the place of a match');
      const back = from[i] | (from[i + 1] << 8);
      i += 2;
      const matched = length(token & 15) + 4;
      if (back === 0 || back > at || matched > stop - at) throw broken('a match within what is unpacked');
      for (let k = 0; k < matched; k++, at++) to[at] = to[at - back];
    }
    return at;
  }

  /** Unpacks `count` integers of 32 bits: two bits a number say how many bytes its difference from the last one takes. The size of the block comes first. */
  integers(count: number, what: string): Int32Array {
    const packed = this.uint64();
    const start = this.at;
    this.need(packed);
    const codes = Math.ceil(count / 4);
    if (count > 0 && codes > MOST_RATIO * packed + CHUNK_BYTES) throw this.fail('bad_count', `no more ${what} than ${packed} bytes can hold`, count, start);
    const data = this.unpack(packed, Math.min(MOST_UNPACKED, MOST_RATIO * packed + CHUNK_BYTES, 4 + codes + 4 * count));
    if (count > 0 && data.length < 4 + codes) throw this.fail('bad_packing', `${count} ${what}`, data.length, start);
    const view = new DataView(data.buffer, data.byteOffset, data.byteLength);
    const values = new Int32Array(count);
    const common = count > 0 ? view.getInt32(0, true) : 0;
    let at = 4 + codes;
    let last = 0;
    for (let i = 0; i < count; i++) {
      const code = (data[4 + (i >> 2)] >> (2 * (i & 3))) & 3;
      const size = code === 3 ? 4 : code;
      if (at + size > data.length) throw this.fail('bad_packing', `${count} ${what}`, i, start);
      const step = code === 0 ? common : code === 1 ? view.getInt8(at) : code === 2 ? view.getInt16(at, true) : view.getInt32(at, true);
      at += size;
      last = (last + step) | 0;
      values[i] = last;
    }
    return values;
  }

  fail(code: string, expected: string, found: number | string, offset: number): MeshError {
    return new MeshError({ code, expected, found: String(found), detail: `expected ${expected}, found ${found}`, offset });
  }
}
