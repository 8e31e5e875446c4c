import { CrateBytes } from './crate-bytes';
import { cratePath, readCratePaths, type CratePaths } from './crate-paths';
import { readCrateValue, readRep, type CrateRep, type CrateTables } from './crate-values';
import { MeshError } from './mesh-error';
import { decodeText } from './text-encoding';
import { MOST_USD_PRIMS, type UsdLayer, type UsdPrim, type UsdValue } from './usd-prim';

const MAGIC = 'PXR-USDC';
const MOST_SECTIONS = 64;
/** Tokens, fields, paths or specs that a crate may have. */
const MOST_ENTRIES = 8 * MOST_USD_PRIMS;
const [ATTRIBUTE, PRIM, PSEUDO_ROOT, RELATIONSHIP] = [1, 6, 7, 8];
const ARCS = ['references', 'payload', 'inheritPaths', 'specializes', 'variantSelection', 'variantSetNames'];
/** The attributes that say something of geometry; the values of others stay packed. */
const WANTED = /^(points|faceVertexCounts|faceVertexIndices|subdivisionScheme|interpolateBoundary|triangleSubdivisionRule|crease\w+|corner\w+|holeIndices|orientation|extent|visibility|purpose|xformOp.*|primvars:skel:joint(Indices|Weights)|skel:joints|joints|elementType|familyName|indices)$/;

interface Field {
  name: string;
  rep: CrateRep;
}

/** Opens a crate's sections and puts its prims together. */
class CrateReader {
  private readonly reader: CrateBytes;
  private readonly sections = new Map<string, number>();
  private tables: CrateTables = { tokens: [], strings: new Uint32Array(0), version: 0, pathOf: () => null };
  private paths: CratePaths = { parent: new Int32Array(0), names: [], isProperty: new Uint8Array(0) };
  private fields: Field[] = [];
  private fieldSets: Int32Array = new Int32Array(0);

  constructor(bytes: Uint8Array) {
    this.reader = new CrateBytes(bytes);
  }

  read(): UsdLayer {
    this.readSections();
    this.readTokens();
    this.readStrings();
    this.readFields();
    this.open('PATHS');
    this.paths = readCratePaths(this.reader, this.tables.tokens, MOST_ENTRIES);
    this.tables.pathOf = (index) => cratePath(this.paths, index);
    return this.readSpecs();
  }

  private readSections(): void {
    const { reader } = this;
    if (decodeText(reader.slice(8)) !== MAGIC) throw reader.fail('bad_magic', MAGIC, 'other bytes', 0);
    const [major, minor, patch] = [reader.uint8(), reader.uint8(), reader.uint8()];
    this.tables.version = 1000 * minor + patch;
    if (major !== 0 || minor < 4) throw reader.fail('unknown_version', 'a crate of version 0.4 or later', `${major}.${minor}.${patch}`, 8);
    reader.seek(16);
    reader.seek(reader.uint64());
    const count = reader.uint64();
    if (count > MOST_SECTIONS) throw reader.fail('bad_count', `at most ${MOST_SECTIONS} sections`, count, reader.at - 8);
    for (let i = 0; i < count; i++) {
      const name = decodeText(reader.slice(16)).replace(/\0.*$/s, '');
      this.sections.set(name, reader.uint64());
      reader.uint64();
    }
  }

  private open(name: string): void {
    const start = this.sections.get(name);
    if (start === undefined) throw this.reader.fail('missing_section', `a section ${name}`, 'none', 16);
    this.reader.seek(start);
  }

  /** A number of entries, at the reader's place. */
  private entries(what: string): number {
    const count = this.reader.uint64();
    if (count > MOST_ENTRIES) throw this.reader.fail('bad_count', `at most ${MOST_ENTRIES} ${what}`, count, this.reader.at - 8);
    return count;
  }

  private readTokens(): void {
    const { reader } = this;
    this.open('TOKENS');
    const count = this.entries('tokens');
    const size = reader.uint64();
    const start = reader.at;
    const data = reader.unpack(reader.uint64(), size);
    const { tokens } = this.tables;
    for (let at = 0, i = 0; i < count; i++) {
      const end = data.indexOf(0, at);
      if (end < 0) throw reader.fail('bad_count', `${count} tokens`, i, start);
      tokens.push(decodeText(data.subarray(at, end)));
      at = end + 1;
    }
  }

  private readStrings(): void {
    if (!this.sections.has('STRINGS')) return;
    this.open('STRINGS');
    const count = this.reader.count(this.entries('strings'), 4, 'strings');
    this.tables.strings = Uint32Array.from({ length: count }, () => this.reader.uint32());
  }

  private readFields(): void {
    const { reader } = this;
    this.open('FIELDS');
    const count = this.entries('fields');
    const names = reader.integers(count, 'field names');
    const start = reader.at;
    const reps = reader.unpack(reader.uint64(), 8 * count);
    if (reps.length < 8 * count) throw reader.fail('bad_count', `${count} values of fields`, Math.floor(reps.length / 8), start);
    const view = new DataView(reps.buffer, reps.byteOffset, reps.byteLength);
    for (let i = 0; i < count; i++) {
      const name = this.tables.tokens[names[i]];
      if (name === undefined) throw reader.fail('bad_index', `one of ${this.tables.tokens.length} tokens`, names[i], start);
      this.fields.push({ name, rep: readRep(view.getUint32(8 * i, true), view.getUint32(8 * i + 4, true)) });
    }
    this.open('FIELDSETS');
    this.fieldSets = reader.integers(this.entries('field sets'), 'field sets');
  }

  /** The fields of a spec: those that its set lists up to the next -1. */
  private fieldsOf(set: number): Map<string, CrateRep> {
    const found = new Map<string, CrateRep>();
    for (let at = set; at < this.fieldSets.length && this.fieldSets[at] !== -1; at++) {
      const field = this.fields[this.fieldSets[at]];
      if (!field || at < 0) throw this.reader.fail('bad_index', `one of ${this.fields.length} fields`, this.fieldSets[at], this.reader.at);
      found.set(field.name, field.rep);
      if (found.size > MOST_SECTIONS) break;
    }
    return found;
  }

  private readSpecs(): UsdLayer {
    const { reader } = this;
    this.open('SPECS');
    const count = this.entries('specs');
    if (count > this.paths.names.length) throw reader.fail('bad_count', `at most one spec for each of ${this.paths.names.length} paths`, count, reader.at - 8);
    const [pathOf, setOf, kindOf] = ['paths of specs', 'field sets of specs', 'kinds of specs'].map((what) => reader.integers(count, what));
    const layer: UsdLayer = { root: [], metersPerUnit: null, upAxis: null, defaultPrim: null, subLayers: [] };
    const prims = new Map<number, UsdPrim>();
    for (let i = 0; i < count; i++) {
      if (!(pathOf[i] >= 0 && pathOf[i] < this.paths.names.length) || setOf[i] < 0) throw reader.fail('bad_index', `one of ${this.paths.names.length} paths`, pathOf[i], reader.at);
      if (kindOf[i] === PSEUDO_ROOT) this.readStage(layer, this.fieldsOf(setOf[i]));
      else if (kindOf[i] === PRIM) prims.set(pathOf[i], this.readPrim(pathOf[i], this.fieldsOf(setOf[i])));
      if (prims.size > MOST_USD_PRIMS) throw reader.fail('too_large', `at most ${MOST_USD_PRIMS} prims`, 'more', reader.at);
    }
    for (const [path, prim] of prims) {
      const above = this.paths.parent[path];
      if (above >= 0 && this.paths.names[above] === '') layer.root.push(prim);
      else prims.get(above)?.children.push(prim);
    }
    for (let i = 0; i < count; i++) {
      const owner = prims.get(this.paths.parent[pathOf[i]]);
      if (owner && (kindOf[i] === ATTRIBUTE || kindOf[i] === RELATIONSHIP)) this.readProperty(owner, this.paths.names[pathOf[i]], kindOf[i], this.fieldsOf(setOf[i]));
    }
    return layer;
  }

  private readPrim(path: number, fields: Map<string, CrateRep>): UsdPrim {
    const specifier = this.value(fields, 'specifier');
    const typeName = this.value(fields, 'typeName');
    return {
      name: this.paths.names[path],
      typeName: typeof typeName === 'string' ? typeName : '',
      specifier: specifier === 'over' || specifier === 'class' ? specifier : 'def',
      attributes: new Map(),
      relationships: new Map(),
      active: this.value(fields, 'active') !== false,
      arcs: ARCS.filter((arc) => fields.has(arc)),
      references: [],
      children: [],
    };
  }

  private readProperty(prim: UsdPrim, name: string, kind: number, fields: Map<string, CrateRep>): void {
    if (kind === RELATIONSHIP) {
      const targets = this.value(fields, 'targetPaths');
      if (Array.isArray(targets)) prim.relationships.set(name, targets.map(String));
    } else if (WANTED.test(name)) {
      const size = this.value(fields, 'elementSize');
      prim.attributes.set(name, { value: this.value(fields, 'default') ?? this.value(fields, 'timeSamples'), elementSize: typeof size === 'number' ? size : 1, animated: fields.has('timeSamples') });
    }
  }

  private readStage(layer: UsdLayer, fields: Map<string, CrateRep>): void {
    const metres = this.value(fields, 'metersPerUnit');
    const axis = this.value(fields, 'upAxis');
    if (typeof metres === 'number') layer.metersPerUnit = metres;
    if (axis === 'Y' || axis === 'Z') layer.upAxis = axis === 'Y' ? 'y' : 'z';
    const defaultPrim = this.value(fields, 'defaultPrim');
    if (typeof defaultPrim === 'string') layer.defaultPrim = defaultPrim;
    if (fields.has('subLayers')) layer.subLayers = ['subLayers'];
  }

  private value(fields: Map<string, CrateRep>, name: string): UsdValue | null {
    const rep = fields.get(name);
    return rep ? readCrateValue(this.reader, this.tables, rep) : null;
  }
}

/**
 * Reads the binary form of a USD layer (crate, version 0.4 and later), without what it refers to. Written after the form that OpenUSD's crateFile documents
 * (from memory), and held in tests to the parser that three ships. Errors: MeshError with the byte.
 */
export function parseCrate(bytes: Uint8Array): UsdLayer {
  if (bytes.length < 24) throw new MeshError({ code: 'truncated', expected: 'a header of 24 bytes', detail: `expected a header of 24 bytes, found ${bytes.length}`, offset: bytes.length });
  return new CrateReader(bytes).read();
}
