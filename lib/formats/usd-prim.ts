/**
 * One prim of a USD layer with what was authored on it, whichever form the layer had. Values are as the form gives them: numbers, strings, booleans, and for arrays
 * a flat typed array or array of numbers or strings (three numbers a point, sixteen a matrix).
 */
export interface UsdPrim {
  name: string;
  typeName: string;
  /** `def`, `over` or `class`: only defined prims are in the scene. */
  specifier: 'def' | 'over' | 'class';
  attributes: Map<string, UsdAttribute>;
  /** Targets by the relationship's name. */
  relationships: Map<string, string[]>;
  active: boolean;
  /** What this layer leaves to others or to a choice: references, payloads, variants, instances. */
  arcs: string[];
  /** Of those, prims of this layer (an empty asset) or of another, by path; an empty path is the layer's default prim. Text layers only. */
  references: { asset: string; path: string }[];
  children: UsdPrim[];
}

export interface UsdAttribute {
  value: UsdValue | null;
  /** Primvar metadata: how many values belong to one element; 1 unless authored. */
  elementSize: number;
  /** Values over time are there; `value` is then the default or, without one, that of the first time. */
  animated: boolean;
}

export type UsdArray = Float64Array | Float32Array | Int32Array | Uint32Array | number[] | string[];
export type UsdValue = number | string | boolean | UsdArray;

/** A layer: the tree below the pseudo-root, and what the stage says of itself. */
export interface UsdLayer {
  root: UsdPrim[];
  metersPerUnit: number | null;
  upAxis: 'y' | 'z' | null;
  defaultPrim: string | null;
  /** Layers that this one builds on, which are not read. */
  subLayers: string[];
}

/** Nesting of prims and of brackets that a layer may have. */
export const MOST_USD_DEPTH = 256;
export const MOST_USD_PRIMS = 1_000_000;

/** An attribute's numbers, flat; null where it has none. */
export function numbersOf(prim: UsdPrim, name: string): ArrayLike<number> | null {
  const value = prim.attributes.get(name)?.value ?? null;
  if (typeof value === 'number') return [value];
  if (value === null || typeof value !== 'object') return null;
  return value.length > 0 && typeof value[0] === 'string' ? null : (value as ArrayLike<number>);
}

export function textOf(prim: UsdPrim, name: string): string | null {
  const value = prim.attributes.get(name)?.value ?? null;
  return typeof value === 'string' ? value : null;
}

/** An attribute's texts; a single one counts as a list of one. */
export function textsOf(prim: UsdPrim, name: string): string[] {
  const value = prim.attributes.get(name)?.value ?? null;
  if (typeof value === 'string') return [value];
  return Array.isArray(value) && value.every((one): one is string => typeof one === 'string') ? value : [];
}
