import type { Three } from '../measured';
import { POLYNOMIAL, type ShellBody } from './shell-sums';
import { PAIRS, TERM_STARTS } from './shell-terms';

/**
 * The wall's ten moments as polynomials in its thickness, [5 moment + power − 1], about the point `centre` (in the body's frame), from the surface's own ten
 * moments `surface` and the shell integrals, both about the body's origin: ∫₀ᵗ Σ c_p s^p ds, and the mitres.
 */
export function shellPolynomials(surface: Float64Array, shell: ShellBody, centre: Three): Float64Array {
  const out = shell.mitres.slice();
  for (let moment = 0; moment < 10; moment++) out[5 * moment] += surface[moment];
  TERM_STARTS.forEach(([volume, first, second], p) => {
    const power = p + 2;
    const take = (start: number, count: number, moment: number): void => {
      if (start >= 0) for (let i = 0; i < count; i++) out[5 * (moment + i) + power - 1] += shell.terms[start + i] / power;
    };
    take(volume, 1, 0);
    take(first, 3, 1);
    take(second, 6, 4);
  });
  return movePolynomials(out, centre);
}

/** The same moments about `centre`, power by power. */
function movePolynomials(about: Float64Array, centre: Three): Float64Array {
  const out = new Float64Array(POLYNOMIAL);
  for (let power = 0; power < 5; power++) {
    const m = (moment: number): number => about[5 * moment + power];
    out[power] = m(0);
    for (let i = 0; i < 3; i++) out[5 * (1 + i) + power] = m(1 + i) - centre[i] * m(0);
    PAIRS.forEach(([i, j], k) => (out[5 * (4 + k) + power] = m(4 + k) - centre[i] * m(1 + j) - centre[j] * m(1 + i) + centre[i] * centre[j] * m(0)));
  }
  return out;
}
