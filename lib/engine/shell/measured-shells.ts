import type { MeasureOptions } from '../measured';
import type { Frames } from '../mesh/frames';
import { openAtHoles } from '../mesh/holes';
import type { Bodies } from '../mesh/partition';
import type { Topology } from '../mesh/topology';
import type { LimitSums } from '../moments/limit-sums';
import { integratePolyhedralShells } from './polyhedral-shell';
import type { ShellBody } from './shell-sums';

/** Shell integrals of all bodies about their origins; null where `options` do not ask for them. `limit` comes from `integrateLimit` under the same options. */
export function measuredShells(mesh: Topology, frames: Frames, bodies: Bodies, limit: LimitSums, options: MeasureOptions): ShellBody[] | null {
  if (options.shells !== true) return null;
  if (options.scheme === 'polyhedral') return integratePolyhedralShells(openAtHoles(mesh, bodies), frames.positions, bodies.bodyOf, frames.origins, bodies.bodies);
  limit.shells?.close();
  return limit.shells?.shells ?? null;
}
