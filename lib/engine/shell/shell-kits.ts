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
  /** First and second largest moduli of the smooth rule's eigenvalues at a valence, 1 apart. */
  modes(valence: number): readonly [lambda: number, mu: number];
}

const QUAD_ALONG: readonly (readonly [number, number])[] = [[1, 0], [0, 1], [-1, 0], [0, -1]];
const QUAD_INWARDS: readonly (readonly [number, number])[] = [[0, 1], [-1, 0], [0, -1], [1, 0]];
const QUAD_OUTER: readonly (readonly [number, number])[] = [[0, 1], [1, 1], [1, 2], [2, 2]];

function quadSideJet(powers: Float64Array, side: number, along: number, out: Float64Array): void {
  if (side === 0) bicubicJet(powers, along, -0.5, out);
  else if (side === 1) bicubicJet(powers, 0.5, along, out);
  else if (side === 2) bicubicJet(powers, -along, 0.5, out);
  else bicubicJet(powers, -0.5, -along, out);
}

/** By how much a smooth fan's terms fall from level to level: λ² (areas), the second modes' μ (∫ 2H), and λ (μ/λ)² (∫ K X), those apart that `imageFall` is for. */
export function shellFall(kit: ShellKit, valence: number): number {
  const [lambda, mu] = kit.modes(valence);
  return Math.max(lambda * lambda, mu, (mu * mu) / lambda);
}

/** The same for the Gauss map's integrals, those of K, K N and K N Nᵀ. */
export function imageFall(kit: ShellKit, valence: number): number {
  const [lambda, mu] = kit.modes(valence);
  return (mu / lambda) ** 2;
}

/** Larger eigenvalue of the Catmull-Clark rule's Fourier mode with cosine c [Stam 1998]. */
function catmullClarkMode(c: number): number {
  return (5 + c + Math.sqrt((c + 9) * (c + 1))) / 16;
}

const QUAD: Omit<ShellKit, 'fan' | 'modes'> = {
  coefficients: 48, toPowers: netToPowers, regularToPowers: netToPowers, add: addBicubicShell, sideJet: quadSideJet, along: QUAD_ALONG, inwards: QUAD_INWARDS, outerSides: QUAD_OUTER,
};

export const CATMULL_CLARK_SHELL: ShellKit = {
  ...QUAD,
  fan: CATMULL_CLARK_KIT,
  modes(n) {
    // The rotation-invariant mode: (3n − 7 + √(5n² − 30n + 49))/(8n); ⅛ comes from the outer rings.
    const even = (3 * n - 7 + Math.sqrt(5 * n * n - 30 * n + 49)) / (8 * n);
    return [n > 2 ? catmullClarkMode(Math.cos((2 * Math.PI) / n)) : 0.5, Math.max(0.125, even, n > 3 ? catmullClarkMode(Math.cos((4 * Math.PI) / n)) : 0)];
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
  modes: () => [0.5, 0.25],
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
  modes(n) {
    const mode = (k: number): number => 3 / 8 + Math.cos((2 * Math.PI * k) / n) / 4;
    return [mode(1), Math.max(0.125, mode(1) ** 2, n > 3 ? mode(2) : 0)];
  },
};
