import { readFileSync } from 'node:fs';
import type { Cage } from '@/lib/engine/cage';
import type { MeasuredPart, MeasureOptions, Six, Three } from '@/lib/engine/measured';
import { readObj } from '@/lib/formats/obj';

/** The cage of one of the files in tests/reference/cages. */
export function referenceCage(file: string): Cage {
  return readObj(readFileSync(new URL(`../reference/cages/${file}`, import.meta.url)));
}

export const CATMULL_CLARK: MeasureOptions = { scheme: 'catmull-clark', boundary: 'edge-only', triangles: 'catmark', creasing: 'uniform', partsBy: 'whole' };

/** A cage from plain lists; `creases` are [vertex, vertex, sharpness]. */
export function cageOf(positions: readonly (readonly number[])[], faces: readonly (readonly number[])[], creases: readonly (readonly [number, number, number])[] = []): Cage {
  const starts = [0];
  for (const face of faces) starts.push(starts[starts.length - 1] + face.length);
  return {
    positions: Float64Array.from(positions.flat()),
    faceStarts: Uint32Array.from(starts),
    faceVertices: Uint32Array.from(faces.flat()),
    groups: null, objects: null, materials: null, joints: null,
    creaseVertices: Uint32Array.from(creases.flatMap(([a, b]) => [a, b])),
    creaseSharpness: Float32Array.from(creases.map(([, , sharpness]) => sharpness)),
    cornerVertices: new Uint32Array(0),
    cornerSharpness: new Float32Array(0),
    boundary: null, faceLines: null, metresPerUnit: null, upAxis: null, warnings: [],
  };
}

export function facesOf(cage: Cage): number[][] {
  return Array.from({ length: cage.faceStarts.length - 1 }, (_, f) => Array.from(cage.faceVertices.subarray(cage.faceStarts[f], cage.faceStarts[f + 1])));
}

/** The same cage with other positions. */
export function moved(cage: Cage, move: (x: number, y: number, z: number) => readonly [number, number, number]): Cage {
  const positions = new Float64Array(cage.positions.length);
  for (let i = 0; i < positions.length; i += 3) positions.set(move(cage.positions[i], cage.positions[i + 1], cage.positions[i + 2]), i);
  return { ...cage, positions };
}

export interface TotalMoments {
  volume: number;
  first: Three;
  second: Six;
}

/** Volume, first and second moments about the file's origin of all components of some parts together. */
export function totalMoments(parts: readonly MeasuredPart[]): TotalMoments {
  const first: Three = [0, 0, 0];
  const second: Six = [0, 0, 0, 0, 0, 0];
  let volume = 0;
  for (const { solid } of parts.flatMap((part) => part.components)) {
    const c = solid.centroid;
    volume += solid.volume;
    for (let i = 0; i < 3; i++) first[i] += solid.volume * c[i];
    const outer = [c[0] * c[0], c[1] * c[1], c[2] * c[2], c[0] * c[1], c[0] * c[2], c[1] * c[2]];
    for (let i = 0; i < 6; i++) second[i] += solid.centralSecond[i] + solid.volume * outer[i];
  }
  return { volume, first, second };
}

/** Half the diagonal of the cage's box plus the largest coordinate of its centre, in modulus: the length of the error norm. */
export function cageSize(cage: Cage): number {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  cage.positions.forEach((value, i) => {
    low[i % 3] = Math.min(low[i % 3], value);
    high[i % 3] = Math.max(high[i % 3], value);
  });
  return Math.hypot(high[0] - low[0], high[1] - low[1], high[2] - low[2]) / 2 + Math.max(...low.map((value, i) => Math.abs(value + high[i]) / 2));
}

/** max |Δ| / (|V| L^k) over the ten moments. */
export function momentError(found: TotalMoments, wanted: TotalMoments, size: number): number {
  const v = Math.abs(wanted.volume);
  return Math.max(
    Math.abs(found.volume - wanted.volume) / v,
    ...wanted.first.map((value, i) => Math.abs(found.first[i] - value) / (v * size)),
    ...wanted.second.map((value, i) => Math.abs(found.second[i] - value) / (v * size * size)),
  );
}

/** The estimates of all components of some parts, weighted by volume as their errors are. */
export function totalEstimate(parts: readonly MeasuredPart[]): number {
  const components = parts.flatMap((part) => part.components);
  const volume = components.reduce((sum, component) => sum + component.solid.volume, 0);
  return components.reduce((sum, component) => sum + Math.abs(component.solid.volume) * component.errorEstimate, 0) / Math.abs(volume);
}
