import type { Fans } from '../schemes/classify-vertices';
import type { LevelMesh } from '../schemes/level-mesh';
import { addFanShell } from './fan-shell';
import type { ShellKit } from './shell-kits';
import { emptyShells, type ShellBody } from './shell-sums';
import { SHELL_TERMS } from './shell-terms';

/** What a rule may err by on a regular patch, relatively. */
const TOLERANCE = 5e-9;

/** Takes the shell integrals of each patch and fan that an integration of a limit surface comes by. */
export class ShellVisitor {
  readonly shells: ShellBody[];
  /** Adds what sharp edges and corners hold, once all patches were seen. */
  finish: () => void = () => undefined;
  private readonly powers: Float64Array;
  private readonly terms = new Float64Array(SHELL_TERMS);

  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(readonly kit: ShellKit, private readonly origins: Float64Array, bodies: number) {
    this.shells = emptyShells(bodies);
    this.powers = new Float64Array(kit.coefficients);
  }

  /** A regular patch by its net. */
  patch(body: number, net: Float64Array): void {
    const { kit, powers, origins, shells, terms } = this;
    kit.regularToPowers(net, powers);
    for (let axis = 0; axis < 3; axis++) powers[axis] -= origins[3 * body + axis];
    const shell = shells[body];
    terms.fill(0);
    kit.add(powers, TOLERANCE, terms, shell.peak, shell.errors);
    for (let i = 0; i < terms.length; i++) shell.terms[i] += terms[i];
  }

  /** An isolated fan. */
  fan(mesh: LevelMesh, fans: Fans, index: number): void {
    addFanShell(this.kit, mesh, fans, index, this.origins, this.shells);
  }
}
