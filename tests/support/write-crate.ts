/**
 * Writes small USD crates (version 0.8.0) for tests, after the form that OpenUSD's crateFile documents (from memory). Tests read them back with three's parser as well,
 * so that writer and reader cannot share a mistake unseen.
 */
export interface CratePrim {
  name: string;
  type: string;
  attributes?: Record<string, CrateValue>;
  relationships?: Record<string, string>;
  children?: CratePrim[];
  specifier?: number;
}

export type CrateValue = { token: string } | { tokens: string[] } | { ints: number[]; elementSize?: number; packed?: boolean } | { floats: number[]; packed?: boolean } | { points: number[] } | { doubles3: number[] } | { matrix: number[] } | { small3: number[] };

export interface CrateStage {
  metersPerUnit?: number;
  upAxis?: string;
  prims: CratePrim[];
}

class Bytes {
  private readonly data: number[] = [];
  get length() {
    return this.data.length;
  }
  raw(bytes: ArrayLike<number>): this {
    for (let i = 0; i < bytes.length; i++) this.data.push(bytes[i]);
    return this;
  }
  u8(value: number) {
    return this.raw([value & 255]);
  }
  u32(value: number) {
    return this.raw(new Uint8Array(Uint32Array.of(value).buffer));
  }
  u64(value: number) {
    return this.u32(value % 2 ** 32).u32(Math.floor(value / 2 ** 32));
  }
  f32(value: number) {
    return this.raw(new Uint8Array(Float32Array.of(value).buffer));
  }
  f64(value: number) {
    return this.raw(new Uint8Array(Float64Array.of(value).buffer));
  }
  take() {
    return Uint8Array.from(this.data);
  }
}

/** One chunk of LZ4 with matches where four bytes repeat, and the byte that says it is one chunk. */
export function packBlock(data: Uint8Array): Uint8Array {
  const out = new Bytes().u8(0);
  const seen = new Map<number, number>();
  const long = (value: number) => {
    for (let rest = value - 15; rest >= 0; rest -= 255) out.u8(Math.min(255, rest));
  };
  let from = 0;
  let at = 0;
  while (at + 12 < data.length) {
    const word = data[at] | (data[at + 1] << 8) | (data[at + 2] << 16) | (data[at + 3] << 24);
    const before = seen.get(word);
    seen.set(word, at);
    if (before === undefined || at - before > 65_535) {
      at++;
      continue;
    }
    let length = 4;
    while (at + length < data.length - 5 && data[before + length] === data[at + length]) length++;
    const literals = at - from;
    out.u8((Math.min(15, literals) << 4) | Math.min(15, length - 4));
    if (literals >= 15) long(literals);
    out.raw(data.subarray(from, at)).u8(at - before).u8((at - before) >> 8);
    if (length - 4 >= 15) long(length - 4);
    at += length;
    from = at;
  }
  const literals = data.length - from;
  out.u8(Math.min(15, literals) << 4);
  if (literals >= 15) long(literals);
  return out.raw(data.subarray(from)).take();
}

/** Integers by their differences, two bits of width each. */
export function packIntegers(values: ArrayLike<number>): Uint8Array {
  const steps = Array.from(values, (value, i) => (value - (i > 0 ? values[i - 1] : 0)) | 0);
  const uses = new Map<number, number>();
  for (const step of steps) uses.set(step, (uses.get(step) ?? 0) + 1);
  const common = [...uses].sort((a, b) => b[1] - a[1])[0]?.[0] ?? 0;
  const codes = new Uint8Array(Math.ceil(steps.length / 4));
  const rest = new Bytes();
  steps.forEach((step, i) => {
    const code = step === common ? 0 : step >= -128 && step < 128 ? 1 : step >= -32_768 && step < 32_768 ? 2 : 3;
    codes[i >> 2] |= code << (2 * (i & 3));
    if (code === 1) rest.u8(step);
    else if (code === 2) rest.u8(step).u8(step >> 8);
    else if (code === 3) rest.u32(step >>> 0);
  });
  return packBlock(new Bytes().u32(common >>> 0).raw(codes).raw(rest.take()).take());
}

const withSize = (out: Bytes, block: Uint8Array) => out.u64(block.length).raw(block);

export function writeCrate(stage: CrateStage): Uint8Array {
  const tokens: string[] = [];
  const token = (text: string) => (tokens.includes(text) ? tokens.indexOf(text) : tokens.push(text) - 1);
  token(';');
  const out = new Bytes().raw(new TextEncoder().encode('PXR-USDC')).raw([0, 8, 0, 0, 0, 0, 0, 0]).u64(0).raw(new Uint8Array(64));
  const fields: { token: number; rep: [number, number] }[] = [];
  const fieldSets: number[] = [];
  const specs: [path: number, set: number, kind: number][] = [];
  const entries: { path: number; element: number; jump: number }[] = [];
  let paths = 0;
  const pathNumbers = new Map<string, number>();

  const INLINED = 1 << 30;
  const ARRAY = 1 << 31;
  const PACKED = 1 << 29;
  const rep = (type: number, flags: number, payload: number): [number, number] => [payload % 2 ** 32, (flags | (type << 16) | Math.floor(payload / 2 ** 32)) >>> 0];
  const stored = (type: number, flags: number, write: () => void) => {
    const at = out.length;
    write();
    return rep(type, flags, at);
  };
  const float32 = (value: number) => new Uint32Array(Float32Array.of(value).buffer)[0];

  function valueRep(value: CrateValue): [number, number] {
    if ('token' in value) return rep(11, INLINED, token(value.token));
    if ('tokens' in value) {
      const indices = value.tokens.map(token);
      return stored(11, ARRAY, () => indices.reduce((bytes, index) => bytes.u32(index), out.u64(indices.length)));
    }
    if ('ints' in value) return stored(3, value.packed ? ARRAY | PACKED : ARRAY, () => (value.packed ? withSize(out.u64(value.ints.length), packIntegers(value.ints)) : value.ints.reduce((bytes, one) => bytes.u32(one >>> 0), out.u64(value.ints.length))));
    if ('floats' in value) return stored(8, value.packed ? ARRAY | PACKED : ARRAY, () => (value.packed ? withSize(out.u64(value.floats.length).u8(0x69), packIntegers(value.floats)) : value.floats.reduce((bytes, one) => bytes.f32(one), out.u64(value.floats.length))));
    if ('points' in value) return stored(24, ARRAY, () => value.points.reduce((bytes, one) => bytes.f32(one), out.u64(value.points.length / 3)));
    if ('doubles3' in value) return stored(23, 0, () => value.doubles3.reduce((bytes, one) => bytes.f64(one), out));
    if ('small3' in value) return rep(24, INLINED, (value.small3[0] & 255) | ((value.small3[1] & 255) << 8) | ((value.small3[2] & 255) << 16));
    return stored(15, 0, () => value.matrix.reduce((bytes, one) => bytes.f64(one), out));
  }

  function addSpec(path: number, kind: number, own: [string, [number, number]][]): void {
    specs.push([path, fieldSets.length, kind]);
    for (const [name, value] of own) fieldSets.push(fields.push({ token: token(name), rep: value }) - 1);
    fieldSets.push(-1);
  }

  const numberOfPath = (path: string) => {
    if (!pathNumbers.has(path)) pathNumbers.set(path, paths++);
    return pathNumbers.get(path)!;
  };

  function addPrim(prim: CratePrim, above: string, last: boolean): void {
    const path = `${above}/${prim.name}`;
    const entry = { path: numberOfPath(path), element: token(prim.name), jump: 0 };
    const at = entries.push(entry) - 1;
    addSpec(entry.path, 6, [['specifier', rep(42, INLINED, prim.specifier ?? 0)], ['typeName', rep(11, INLINED, token(prim.type))]]);
    const inside = [...Object.keys(prim.attributes ?? {}), ...Object.keys(prim.relationships ?? {}), ...(prim.children ?? [])];
    inside.forEach((one, i) => {
      const isLast = i === inside.length - 1;
      if (typeof one !== 'string') return addPrim(one, path, isLast);
      const property = numberOfPath(`${path}.${one}`);
      entries.push({ path: property, element: -token(one), jump: isLast ? -2 : 0 });
      const target = prim.relationships?.[one];
      if (target !== undefined) {
        const pathIndex = numberOfPath(target);
        addSpec(property, 8, [['targetPaths', stored(34, 0, () => out.u8(3).u64(1).u32(pathIndex))]]);
        return;
      }
      const value = prim.attributes![one];
      addSpec(property, 1, [['default', valueRep(value)], ...('elementSize' in value && value.elementSize !== undefined ? [['elementSize', rep(3, INLINED, value.elementSize)] as [string, [number, number]]] : [])]);
    });
    entry.jump = inside.length > 0 ? (last ? -1 : entries.length - at) : last ? -2 : 0;
  }

  const root = { path: numberOfPath('/'), element: 0, jump: stage.prims.length > 0 ? -1 : -2 };
  entries.push(root);
  addSpec(root.path, 7, [
    ...(stage.metersPerUnit === undefined ? [] : [['metersPerUnit', rep(9, INLINED, float32(stage.metersPerUnit))] as [string, [number, number]]]),
    ...(stage.upAxis === undefined ? [] : [['upAxis', rep(11, INLINED, token(stage.upAxis))] as [string, [number, number]]]),
  ]);
  stage.prims.forEach((prim, i) => addPrim(prim, '', i === stage.prims.length - 1));

  const sections: [string, number, number][] = [];
  const section = (name: string, write: () => void) => {
    const start = out.length;
    write();
    sections.push([name, start, out.length - start]);
  };
  section('TOKENS', () => {
    const data = new TextEncoder().encode(`${tokens.join('\0')}\0`);
    withSize(out.u64(tokens.length).u64(data.length), packBlock(data));
  });
  section('STRINGS', () => out.u64(0));
  section('FIELDS', () => {
    withSize(out.u64(fields.length), packIntegers(fields.map((field) => field.token)));
    withSize(out, packBlock(fields.reduce((bytes, field) => bytes.u32(field.rep[0]).u32(field.rep[1]), new Bytes()).take()));
  });
  section('FIELDSETS', () => withSize(out.u64(fieldSets.length), packIntegers(fieldSets)));
  section('PATHS', () => {
    out.u64(paths).u64(entries.length);
    withSize(out, packIntegers(entries.map((entry) => entry.path)));
    withSize(out, packIntegers(entries.map((entry) => entry.element)));
    withSize(out, packIntegers(entries.map((entry) => entry.jump)));
  });
  section('SPECS', () => {
    out.u64(specs.length);
    for (let column = 0; column < 3; column++) withSize(out, packIntegers(specs.map((spec) => spec[column])));
  });
  const toc = out.length;
  out.u64(sections.length);
  for (const [name, start, size] of sections) out.raw(new TextEncoder().encode(name.padEnd(16, '\0'))).u64(start).u64(size);
  const bytes = out.take();
  new DataView(bytes.buffer).setUint32(16, toc, true);
  return bytes;
}
