import type { Six } from '../measured';

/** Eigenvalues ascending with their unit eigenvectors as rows. */
export interface SymmetricEigen {
  values: [number, number, number];
  vectors: [number[], number[], number[]];
}

/**
 * Eigen decomposition of a symmetric 3 × 3 matrix (xx, yy, zz, xy, xz, yz) by cyclic Jacobi rotations [Jacobi 1846; Rutishauser 1966].
 * Uses + − × ÷ √ only, which IEEE 754 rounds alike everywhere, so every machine returns the same digits.
 */
export function symmetricEigen(matrix: Six): SymmetricEigen {
  const [xx, yy, zz, xy, xz, yz] = matrix;
  const a = [[xx, xy, xz], [xy, yy, yz], [xz, yz, zz]];
  const v = [[1, 0, 0], [0, 1, 0], [0, 0, 1]];
  for (let sweep = 0; sweep < 60; sweep++) {
    if (a[0][1] === 0 && a[0][2] === 0 && a[1][2] === 0) break;
    for (const [p, q] of [[0, 1], [0, 2], [1, 2]]) rotate(a, v, p, q);
  }
  const order = [0, 1, 2].sort((i, j) => a[i][i] - a[j][j] || i - j);
  return {
    values: [a[order[0]][order[0]], a[order[1]][order[1]], a[order[2]][order[2]]],
    vectors: [column(v, order[0]), column(v, order[1]), column(v, order[2])],
  };
}

function column(v: number[][], j: number): number[] {
  const size = Math.sqrt(v[0][j] * v[0][j] + v[1][j] * v[1][j] + v[2][j] * v[2][j]);
  return [v[0][j] / size, v[1][j] / size, v[2][j] / size];
}

function rotate(a: number[][], v: number[][], p: number, q: number): void {
  const apq = a[p][q];
  if (apq === 0) return;
  const app = a[p][p];
  const aqq = a[q][q];
  // An entry too small to change either diagonal element is rounding: setting it to 0 ends the sweeps.
  if (app + apq === app && aqq + apq === aqq && Math.abs(apq) <= 2 ** -60 * Math.min(Math.abs(app), Math.abs(aqq))) {
    a[p][q] = a[q][p] = 0;
    return;
  }
  const theta = (aqq - app) / (2 * apq);
  const t = (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
  const c = 1 / Math.sqrt(t * t + 1);
  const s = t * c;
  a[p][p] = app - t * apq;
  a[q][q] = aqq + t * apq;
  a[p][q] = a[q][p] = 0;
  const r = 3 - p - q;
  const arp = a[r][p];
  const arq = a[r][q];
  a[r][p] = a[p][r] = c * arp - s * arq;
  a[r][q] = a[q][r] = s * arp + c * arq;
  for (let k = 0; k < 3; k++) {
    const vkp = v[k][p];
    const vkq = v[k][q];
    v[k][p] = c * vkp - s * vkq;
    v[k][q] = s * vkp + c * vkq;
  }
}
