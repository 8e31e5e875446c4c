import { MeshError } from './mesh-error';
import { MAX_COORDINATE } from './mesh-limits';

const AXES = ['x', 'y', 'z'];

/**
 * Refuses coordinates that are not finite or beyond ±1e50. `offsetOf` tells where in the file a vertex lies, in bytes; null where that is not known.
 * `owner` begins the sentence, such as "mesh body: ". Errors: not_finite, number_too_large.
 */
export function checkCoordinates(positions: Float64Array, owner: string, offsetOf: ((vertex: number) => number) | null): void {
  for (let i = 0; i < positions.length; i++) {
    const value = positions[i];
    if (value >= -MAX_COORDINATE && value <= MAX_COORDINATE) continue;
    const vertex = Math.floor(i / 3);
    const finite = Number.isFinite(value);
    throw new MeshError({
      code: finite ? 'number_too_large' : 'not_finite',
      expected: 'a finite number between −1e50 and 1e50',
      found: String(value),
      detail: `${owner}expected a finite number between −1e50 and 1e50 for ${AXES[i % 3]} of vertex ${vertex}, found ${value}`,
      offset: offsetOf?.(vertex) ?? null,
    });
  }
}
