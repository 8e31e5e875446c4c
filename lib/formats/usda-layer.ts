import { MeshError } from './mesh-error';
import { MOST_USD_DEPTH, MOST_USD_PRIMS, type UsdLayer, type UsdPrim, type UsdValue } from './usd-prim';
import { UsdTokens } from './usd-tokens';
import { readUsdMetadata, readUsdValue, skipBrackets } from './usda-values';

const SPECIFIERS = new Set(['def', 'over', 'class']);
const LIST_OPERATIONS = new Set(['prepend', 'append', 'add', 'delete', 'reorder']);
const QUALIFIERS = new Set(['custom', 'uniform', 'varying', 'config']);
const ARCS = ['references', 'payload', 'inherits', 'specializes', 'variants', 'variantSets'];

/** Reads the prims of a `.usda` text, one after the other. */
class UsdaReader {
  private readonly tokens: UsdTokens;
  private prims = 0;

  constructor(source: string) {
    this.tokens = new UsdTokens(source);
  }

  read(): UsdLayer {
    const { tokens } = this;
    const metadata = tokens.isMark('(') ? readUsdMetadata(tokens) : new Map();
    const root: UsdPrim[] = [];
    while (tokens.kind !== 'end') {
      if (tokens.isWord('reorder')) this.skipStatement();
      else root.push(this.readPrim(0));
    }
    const metres = metadata.get('metersPerUnit');
    const axis = metadata.get('upAxis');
    const subLayers = metadata.get('subLayers');
    const defaultPrim = metadata.get('defaultPrim');
    return {
      root,
      metersPerUnit: typeof metres === 'number' ? metres : null,
      upAxis: axis === 'Y' ? 'y' : axis === 'Z' ? 'z' : null,
      defaultPrim: typeof defaultPrim === 'string' ? defaultPrim : null,
      subLayers: Array.isArray(subLayers) && String(subLayers[0]).includes('@') ? [String(subLayers[0])] : [],
    };
  }

  private readPrim(depth: number): UsdPrim {
    const { tokens } = this;
    if (tokens.kind !== 'word' || !SPECIFIERS.has(tokens.text)) throw tokens.fail('bad_syntax', 'def, over or class');
    if (depth >= MOST_USD_DEPTH) throw tokens.fail('too_deep', `prims nested at most ${MOST_USD_DEPTH} deep`);
    if (++this.prims > MOST_USD_PRIMS) throw tokens.fail('too_large', `at most ${MOST_USD_PRIMS} prims`);
    const specifier = tokens.takeText('word', 'def, over or class') as UsdPrim['specifier'];
    const typeName = tokens.kind === 'word' ? tokens.takeText('word', 'a type') : '';
    const name = tokens.takeText('string', 'the name of the prim in quotation marks');
    const prim: UsdPrim = { name, typeName, specifier, attributes: new Map(), relationships: new Map(), active: true, arcs: [], references: [], children: [] };
    if (tokens.isMark('(')) {
      const metadata = readUsdMetadata(tokens);
      prim.active = metadata.get('active') !== false && metadata.get('active') !== 0;
      prim.arcs.push(...ARCS.filter((arc) => metadata.has(arc)));
      for (const arc of ['references', 'payload']) prim.references.push(...referencesIn(metadata.get(arc)));
    }
    tokens.take('{');
    while (!tokens.isMark('}')) this.readStatement(prim, depth);
    tokens.next();
    return prim;
  }

  private readStatement(prim: UsdPrim, depth: number): void {
    const { tokens } = this;
    if (tokens.kind !== 'word') throw tokens.fail('bad_syntax', 'a prim, an attribute, a relationship or "}"');
    if (SPECIFIERS.has(tokens.text)) prim.children.push(this.readPrim(depth + 1));
    else if (tokens.isWord('variantSet')) this.skipVariants(prim);
    else this.readProperty(prim);
  }

  private skipVariants(prim: UsdPrim): void {
    const { tokens } = this;
    if (!prim.arcs.includes('variantSets')) prim.arcs.push('variantSets');
    tokens.next();
    tokens.next();
    tokens.take('=');
    if (!tokens.isMark('{')) throw tokens.fail('bad_syntax', '"{"');
    skipBrackets(tokens);
  }

  private skipStatement(): void {
    const { tokens } = this;
    while (tokens.kind === 'word') tokens.next();
    tokens.take('=');
    readUsdValue(tokens);
  }

  private readProperty(prim: UsdPrim): void {
    const { tokens } = this;
    let deleted = false;
    while (tokens.kind === 'word' && (QUALIFIERS.has(tokens.text) || LIST_OPERATIONS.has(tokens.text))) {
      if (tokens.isWord('reorder')) return this.skipStatement();
      deleted ||= tokens.isWord('delete');
      tokens.next();
    }
    if (tokens.kind !== 'word') throw tokens.fail('bad_syntax', 'the type of an attribute, or rel');
    const isRelationship = tokens.text === 'rel';
    tokens.next();
    if (tokens.kind !== 'word') throw tokens.fail('bad_syntax', 'the name of the property');
    const [name, aspect = ''] = tokens.text.split('.', 2);
    tokens.next();
    if (isRelationship) this.readTargets(prim, name, deleted);
    else this.readAttribute(prim, name, aspect);
    if (tokens.isMark('(')) {
      const size = readUsdMetadata(tokens).get('elementSize');
      const attribute = prim.attributes.get(name);
      if (attribute && typeof size === 'number') attribute.elementSize = size;
    }
  }

  private readTargets(prim: UsdPrim, name: string, deleted: boolean): void {
    const { tokens } = this;
    if (!tokens.isMark('=')) return;
    tokens.next();
    const value = readUsdValue(tokens);
    const targets = typeof value === 'string' ? [value] : Array.isArray(value) ? value.map(String) : [];
    if (!deleted) prim.relationships.set(name, targets);
  }

  private readAttribute(prim: UsdPrim, name: string, aspect: string): void {
    const { tokens } = this;
    const attribute = prim.attributes.get(name) ?? { value: null, elementSize: 1, animated: false };
    prim.attributes.set(name, attribute);
    if (!tokens.isMark('=')) return;
    tokens.next();
    if (aspect === 'timeSamples') {
      const first = this.readSamples();
      attribute.animated = true;
      attribute.value ??= first;
    } else if (aspect === '') attribute.value = readUsdValue(tokens);
    else readUsdValue(tokens);
  }

  /** The value of the lowest time. */
  private readSamples() {
    const { tokens } = this;
    tokens.take('{');
    let first: ReturnType<typeof readUsdValue> = null;
    let earliest = Infinity;
    while (!tokens.isMark('}')) {
      if (tokens.kind !== 'number') throw tokens.fail('bad_syntax', 'a time or "}"');
      const time = tokens.number;
      tokens.next();
      tokens.take(':');
      const value = readUsdValue(tokens);
      if (time < earliest) {
        earliest = time;
        first = value;
      }
    }
    tokens.next();
    return first;
  }
}

/** Layers and prims in the text of a reference or of a list of them. */
function referencesIn(value: UsdValue | null | undefined): UsdPrim['references'] {
  const source = Array.isArray(value) ? String(value[0]) : '';
  return Array.from(source.matchAll(/@([^@]*)@(?:<([^>]*)>)?|<([^>]*)>/g), ([, asset = '', path = '', own = '']) => ({ asset, path: path || own }));
}

/** Reads the text form of a USD layer, without what it refers to. Source: the .usda files of the standard's own documentation (from memory). Errors: MeshError with line and column. */
export function parseUsda(source: string): UsdLayer {
  if (!/^#usda 1\./.test(source)) throw new MeshError({ code: 'bad_magic', expected: '#usda 1.0', detail: 'expected "#usda 1.0" on the first line', place: { line: 1, column: 1, text: source.slice(0, 80).split('\n')[0] } });
  return new UsdaReader(source).read();
}
