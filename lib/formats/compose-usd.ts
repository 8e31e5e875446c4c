import type { Beside } from './beside';
import { extensionOf } from './mesh-extensions';
import { MeshError } from './mesh-error';
import { MOST_USD_PRIMS, type UsdLayer, type UsdPrim } from './usd-prim';

const MOST_REFERENCES = 10_000;
const MOST_DEPTH = 16;
const FOLLOWED = new Set(['references', 'payload']);

interface Open {
  /** Reads a layer from its bytes. */
  parse(bytes: Uint8Array): UsdLayer;
  beside: Beside;
  layers: Map<string, UsdLayer | null>;
  followed: number;
  /** Prims walked, those that are reached twice counted twice. */
  visited: number;
}

/**
 * Brings in what prims of a text layer refer to, as far as it lies in the same archive, or in the layer itself: a prim takes the attributes, relationships and
 * children of the one that it refers to wherever it has none of its own. What lies elsewhere stays an arc, to be said. Layers that refer to one another in a circle
 * are refused. Offsets in time are not looked at. Errors: MeshError reference_circle, too_deep, too_large, and those of the layers, by their names.
 */
export async function composeUsd(layer: UsdLayer, parse: Open['parse'], beside: Beside): Promise<void> {
  await followAll(layer.root, layer, '', { parse, beside, layers: new Map(), followed: 0, visited: 0 }, []);
}

async function followAll(prims: UsdPrim[], layer: UsdLayer, file: string, open: Open, chain: string[]): Promise<void> {
  for (const prim of prims) {
    if (++open.visited > MOST_USD_PRIMS) throw new MeshError({ code: 'too_large', expected: `at most ${MOST_USD_PRIMS} prims`, detail: `expected at most ${MOST_USD_PRIMS} prims with all that is referred to, found more` });
    let isLost = false;
    for (const { asset, path } of prim.references) isLost = !(await follow(prim, asset, path, { layer, file, open, chain })) || isLost;
    // Of several references one may be here and another not: what is not is said.
    if (isLost && !prim.arcs.some((arc) => FOLLOWED.has(arc))) prim.arcs.push('references');
    // A prim that was referred to brings its own references along, already followed.
    prim.references = [];
    await followAll(prim.children, layer, file, open, chain);
  }
}

/** Whether what is referred to was found. */
async function follow(prim: UsdPrim, asset: string, path: string, { layer, file, open, chain }: { layer: UsdLayer; file: string; open: Open; chain: string[] }): Promise<boolean> {
  if (++open.followed > MOST_REFERENCES) throw new MeshError({ code: 'too_large', expected: `at most ${MOST_REFERENCES} references`, detail: `expected at most ${MOST_REFERENCES} references between prims, found more` });
  const there = asset === '' ? file : besideOf(file, asset);
  const key = `${there}<${path}>`;
  if (chain.includes(key)) throw new MeshError({ code: 'reference_circle', found: key, detail: `prim ${prim.name.slice(0, 200)}: expected references that end, found a circle through ${key.slice(0, 200)}` });
  if (chain.length >= MOST_DEPTH) throw new MeshError({ code: 'too_deep', expected: `references at most ${MOST_DEPTH} deep`, detail: `expected references at most ${MOST_DEPTH} deep, found more` });
  const target = asset === '' ? layer : await loadLayer(there, open);
  const found = target && findPrim(target, path);
  if (!target || !found) return false;
  await followAll([found], target, there, open, [...chain, key]);
  take(prim, found);
  return true;
}

/** The path of a file that another file names, both seen from the first layer. */
function besideOf(file: string, asset: string): string {
  const parts = file.split('/').slice(0, -1);
  for (const part of asset.split('/')) {
    if (part === '..' && parts.length > 0 && parts.at(-1) !== '..') parts.pop();
    else if (part !== '.' && part !== '') parts.push(part);
  }
  return parts.join('/');
}

async function loadLayer(name: string, open: Open): Promise<UsdLayer | null> {
  const known = open.layers.get(name);
  if (known !== undefined) return known;
  const bytes = ['usd', 'usda', 'usdc'].includes(extensionOf(name)) ? await open.beside(name) : null;
  try {
    const layer = bytes && open.parse(bytes);
    open.layers.set(name, layer);
    return layer;
  } catch (error) {
    throw error instanceof MeshError ? error.within(name.slice(0, 200)) : error;
  }
}

function findPrim(layer: UsdLayer, path: string): UsdPrim | null {
  let prims = layer.root;
  let found: UsdPrim | null = null;
  for (const name of path === '' ? [layer.defaultPrim ?? layer.root[0]?.name ?? ''] : path.split('/').filter((part) => part !== '')) {
    found = prims.find((prim) => prim.name === name) ?? null;
    if (!found) return null;
    prims = found.children;
  }
  return found;
}

function take(prim: UsdPrim, from: UsdPrim): void {
  if (prim.typeName === '') prim.typeName = from.typeName;
  for (const [name, attribute] of from.attributes) if ((prim.attributes.get(name)?.value ?? null) === null) prim.attributes.set(name, attribute);
  for (const [name, targets] of from.relationships) if (!prim.relationships.has(name)) prim.relationships.set(name, targets);
  const own = new Map(prim.children.map((child, i) => [child.name, i]));
  for (const child of from.children) {
    const at = own.get(child.name);
    if (at === undefined) prim.children.push(child);
    else {
      // Children may be shared with other prims by now: what is changed is a copy. What is only said over the other's child does not make it less defined.
      const over = prim.children[at];
      prim.children[at] = { ...over, specifier: over.specifier === 'over' ? child.specifier : over.specifier, attributes: new Map(over.attributes), relationships: new Map(over.relationships), children: [...over.children] };
      take(prim.children[at], child);
    }
  }
  prim.arcs = [...prim.arcs.filter((arc) => !FOLLOWED.has(arc)), ...from.arcs.filter((arc) => !prim.arcs.includes(arc))];
}
