import type { Scheme } from '../cage';
import type { LimitSums } from '../moments/limit-sums';
import type { LevelMesh } from '../schemes/level-mesh';
import { collectSides } from './crease-sides';
import { estimateTips, integrateCreases } from './integrate-creases';
import { CATMULL_CLARK_SHELL, DOO_SABIN_SHELL, LOOP_SHELL } from './shell-kits';
import { ShellVisitor } from './shell-visitor';

/** Lets an integration of the limit surface of `cage` that fills `sums` measure shells too. */
export function watchShells(cage: LevelMesh, scheme: Scheme, origins: Float64Array, bodies: number, sums: LimitSums): void {
  const kit = scheme === 'loop' ? LOOP_SHELL : scheme === 'doo-sabin' ? DOO_SABIN_SHELL : CATMULL_CLARK_SHELL;
  const visitor = new ShellVisitor(kit, origins, bodies);
  sums.shells = visitor;
  // Doo-Sabin surfaces have no creases.
  if (scheme === 'doo-sabin') return;
  const sides = collectSides(cage, sums.curves, kit.coefficients, kit.toPowers);
  visitor.finish = () => {
    integrateCreases(kit, cage, sides, origins, visitor.shells);
    estimateTips(cage, visitor.shells);
  };
}
