import { netToPowers } from '../patches/bicubic-powers';
import { triangleToPowers } from '../patches/box-spline';
import { CATMULL_CLARK_KIT } from '../schemes/catmull-clark-kit';
import { DOO_SABIN_KIT, raiseNet } from '../schemes/doo-sabin-fan';
import type { FanKit } from '../schemes/fan-kit';
import { LOOP_KIT } from '../schemes/loop-kit';
import { addBicubicShell, bicubicJet, type ShellErrors } from './bicubic-shell';
import type { CurvaturePeak } from './shell-terms';
import { addTriangleShell, triangleJet } from './triangle-shell';

/** What shell integrals need of a scheme beyond its fans. Sides of a patch go counter-clockwise seen from outside. */
export interface ShellKit {
  fan: FanKit;
  /** Coefficients of a patch: from its net to powers. */
  coefficients: number;
  toPowers(net: Float64Array, powers: Float64Array): void;
  /** The same for the nets of regular patches, which may be of lower degree. */
  regularToPowers(net: Float64Array, powers: Float64Array): void;
  add(powers: Float64Array, tolerance: number, out: Float64Array, peak: CurvaturePeak, errors: ShellErrors): void;
  /** Fills the jet at `along` (−½ … ½) of a side. */
  sideJet(powers: Float64Array, side: number, along: number, out: Float64Array): void;
  /** Direction of each side in the patch's parameters, and the one that leads from it into the patch. */
  along: readonly (readonly [number, number])[];
  inwards: readonly (readonly [number, number])[];
  /** Sides [child, side] of a sector's children that bound the fan. */
  outerSides: readonly (readonly [number, number])[];
  /** Squared largest eigenvalues of the smooth rule at a valence by which the fan's shell terms fall, those apart that `gaussImage` takes. */
  fall(valence: number): number;
}

const QUAD_ALONG: readonly (readonly [number, number])[] = [[1, 0], [0, 1], [-1, 0], [0, -1]];
const QUAD_INWARDS: readonly (readonly [number, number])[] = [[0, 1], [-1, 0], [0, -1], [1, 0]];
const QUAD_OUTER: readonly (readonly [number, number])[] = [[0, 1], [1, 1], [1, 2], [2, 2]];

function quadSideJet(powers: Float64Array, side: number, along: number, out: Float64Array): void {
  const [u, v] = [[along, -0.5], [0.5, along], [-along, 0.5], [-0.5, -along]][side];
  bicubicJet(powers, u, v, out);
}

/** Terms fall by λ² (areas), by the second modes' μ (∫ 2H), and by λ (μ/λ)² (∫ K X), λ and μ the first and second largest moduli. */
function largestFall(lambda: number, mu: number): number {
  return Math.max(lambda * lambda, mu, (mu * mu) / lambda);
}

/** Larger eigenvalue of the Catmull-Clark rule's Fourier mode with cosine c [Stam 1998]. */
function catmullClarkMode(c: number): number {
  return (5 + c + Math.sqrt((c + 9) * (c + 1))) / 16;
}

const QUAD: Omit<ShellKit, 'fan' | 'fall'> = {
  coefficients: 48, toPowers: netToPowers, regularToPowers: netToPowers, add: addBicubicShell, sideJet: quadSideJet, along: QUAD_ALONG, inwards: QUAD_INWARDS, outerSides: QUAD_OUTER,
};

export const CATMULL_CLARK_SHELL: ShellKit = {
  ...QUAD,
  fan: CATMULL_CLARK_KIT,
  fall(n) {
    // The rotation-invariant mode: (3n − 7 + √(5n² − 30n + 49))/(8n); ¼ comes from the outer rings.
    const even = (3 * n - 7 + Math.sqrt(5 * n * n - 30 * n + 49)) / (8 * n);
    return largestFall(n > 2 ? catmullClarkMode(Math.cos((2 * Math.PI) / n)) : 0.5, Math.max(0.25, even, n > 3 ? catmullClarkMode(Math.cos((4 * Math.PI) / n)) : 0));
  },
};

const raised = new Float64Array(48);

export const DOO_SABIN_SHELL: ShellKit = {
  ...QUAD,
  fan: DOO_SABIN_KIT,
  regularToPowers(net, powers) {
    raiseNet(net, raised);
    netToPowers(raised, powers);
  },
  fall: () => largestFall(0.5, 0.25),
};

export const LOOP_SHELL: ShellKit = {
  fan: LOOP_KIT,
  coefficients: 45,
  toPowers: triangleToPowers,
  regularToPowers: triangleToPowers,
  add: addTriangleShell,
  sideJet(powers, side, along, out) {
    const x = 0.5 + along;
    const [s, t] = [[x, 0], [1 - x, x], [0, 1 - x]][side];
    triangleJet(powers, s, t, out);
  },
  along: [[1, 0], [-1, 1], [0, -1]],
  inwards: [[0, 1], [-1, 0], [1, 0]],
  outerSides: [[0, 1], [2, 1]],
  fall(n) {
    const mode = (k: number): number => 3 / 8 + Math.cos((2 * Math.PI * k) / n) / 4;
    return largestFall(Math.max(mode(1), mode(1) ** 2, 0.25), Math.max(0.25, mode(1) ** 2, n > 3 ? mode(2) : 0));
  },
};
