// What the kernels of lib/run/build-kernel.mjs compute at a node, for each shape of patch. Operations are written once, for both dialects.

export const AXES = ['x', 'y', 'z'];
export const SUMS = ['', 'x', 'y', 'z', 'xx', 'yy', 'zz', 'xy', 'xz', 'yz'];
export const DIVISORS = [3, 4, 4, 4, 5, 5, 5, 5, 5, 5];

const perAxis = (write) => AXES.flatMap((axis, k) => write(axis, k));

/** Position (e, o), ∂u (ue, uo) and ∂v (ve, vo) of a pair of nodes ±v, in even and odd parts; `point`: the position is wanted too. */
const evenAndOdd = (point, parts) => perAxis((axis) => {
  const { e, o, ue, uo, ve, vo } = parts(axis);
  return [
    ...(point ? [`let ${axis}e = ${e}`, `let ${axis}o = ${o}`] : []),
    `let ${axis}ue = ${ue}`, `let ${axis}uo = ${uo}`, `let ${axis}ve = ${ve}`, `let ${axis}vo = ${vo}`,
  ];
});

/** Four-sided patches have the same rule along u and v. */
const square = { alongNodes: 'nodes', alongCount: 'count' };

const bicubic = {
  ...square,
  name: 'bicubic',
  values: 48,
  coefficients: 48,
  /** B-spline values to powers of t − ½, as lib/engine/patches/bicubic-powers.ts does it. */
  toPowers: [
    'let c0 = p[at]', 'let c1 = p[at + stride]', 'let c2 = p[at + 2 * stride]', 'let c3 = p[at + 3 * stride]',
    'let s1 = c1 + c2', 'let t = (c0 + c3) - s1', 'let d0 = c3 - c0', 'let d1 = c2 - c1',
    'p[at] := s1 / 2 + t / 48', 'p[at + stride] := (d0 + 5 * d1) / 8', 'p[at + 2 * stride] := t / 4', 'p[at + 3 * stride] := (d0 - 3 * d1) / 6',
  ],
  order: 4,
  /** The line u = const: coefficients in v of X (a) and X_u (d). */
  line: (point) => [
    'let u = nodes[i]', 'let wu = weights[i]', 'let u2 = u * u', 'let ud2 = 2 * u', 'let ud3 = 3 * u2',
    ...perAxis((axis, k) => [0, 1, 2, 3].flatMap((j) => {
      const q = [0, 1, 2, 3].map((power) => `p[${12 * power + 3 * j + k}]`);
      return [
        ...(point || j > 0 ? [`let ${axis}a${j} = (${q[0]} + u2 * ${q[2]}) + u * (${q[1]} + u2 * ${q[3]})`] : []),
        `let ${axis}d${j} = ${q[1]} + ud2 * ${q[2]} + ud3 * ${q[3]}`,
      ];
    })),
  ],
  pair: (point) => [
    'let v = nodes[count - 1 - j]', 'let w = wu * weights[j]', 'let v2 = v * v', 'let vd2 = 2 * v', 'let vd3 = 3 * v2',
    ...evenAndOdd(point, (a) => ({
      e: `${a}a0 + v2 * ${a}a2`, o: `v * (${a}a1 + v2 * ${a}a3)`, ue: `${a}d0 + v2 * ${a}d2`, uo: `v * (${a}d1 + v2 * ${a}d3)`,
      ve: `${a}a1 + vd3 * ${a}a3`, vo: `vd2 * ${a}a2`,
    })),
  ],
};

const biquadratic = {
  ...square,
  name: 'biquadratic',
  values: 27,
  coefficients: 27,
  /** Uniform quadratic B-spline values to powers of t − ½. */
  toPowers: [
    'let c0 = p[at]', 'let c1 = p[at + stride]', 'let c2 = p[at + 2 * stride]', 'let s = c0 + c2',
    'p[at] := (s + 6 * c1) / 8', 'p[at + stride] := (c2 - c0) / 2', 'p[at + 2 * stride] := s / 2 - c1',
  ],
  order: 3,
  line: (point) => [
    'let u = nodes[i]', 'let wu = weights[i]', 'let u2 = u * u', 'let ud2 = 2 * u',
    ...perAxis((axis, k) => [0, 1, 2].flatMap((j) => {
      const q = [0, 1, 2].map((power) => `p[${9 * power + 3 * j + k}]`);
      return [
        ...(point || j > 0 ? [`let ${axis}a${j} = (${q[0]} + u2 * ${q[2]}) + u * ${q[1]}`] : []),
        `let ${axis}d${j} = ${q[1]} + ud2 * ${q[2]}`,
      ];
    })),
  ],
  pair: (point) => [
    'let v = nodes[count - 1 - j]', 'let w = wu * weights[j]', 'let v2 = v * v', 'let vd2 = 2 * v',
    ...evenAndOdd(point, (a) => ({
      e: `${a}a0 + v2 * ${a}a2`, o: `v * ${a}a1`, ue: `${a}d0 + v2 * ${a}d2`, uo: `v * ${a}d1`, ve: `${a}a1`, vo: `vd2 * ${a}a2`,
    })),
  ],
};

/**
 * Quartic in u = s − ½ and v = t − (1 − s)/2, whose nodes on the line u = const are ± (½ − u) times those of the square: one more along u, since the weight
 * ½ − u costs a degree. Coefficient (i, j) of u^i v^j stands at i + j's triangle number plus j.
 */
const triangle = {
  alongNodes: 'alongNodes',
  alongCount: 'count + 1',
  name: 'triangle',
  values: 36,
  coefficients: 45,
  line: (point) => [
    'let u = alongNodes[i]', 'let rest = 1 / 2 - u', 'let wu = alongWeights[i] * rest', 'let u2 = u * u', 'let ud2 = 2 * u', 'let ud3 = 3 * u2', 'let ud4 = 4 * u * u2',
    ...perAxis((axis, k) => {
      const c = (i, j) => `p[${3 * (((i + j) * (i + j + 1)) / 2 + j) + k}]`;
      return [
        ...(point ? [`let ${axis}a0 = (${c(0, 0)} + u2 * (${c(2, 0)} + u2 * ${c(4, 0)})) + u * (${c(1, 0)} + u2 * ${c(3, 0)})`] : []),
        `let ${axis}a1 = (${c(0, 1)} + u2 * ${c(2, 1)}) + u * (${c(1, 1)} + u2 * ${c(3, 1)})`,
        `let ${axis}a2 = ${c(0, 2)} + u * ${c(1, 2)} + u2 * ${c(2, 2)}`,
        `let ${axis}a3 = ${c(0, 3)} + u * ${c(1, 3)}`,
        `let ${axis}a4 = ${c(0, 4)}`,
        `let ${axis}d0 = ${c(1, 0)} + ud2 * ${c(2, 0)} + ud3 * ${c(3, 0)} + ud4 * ${c(4, 0)}`,
        `let ${axis}d1 = ${c(1, 1)} + ud2 * ${c(2, 1)} + ud3 * ${c(3, 1)}`,
        `let ${axis}d2 = ${c(1, 2)} + ud2 * ${c(2, 2)}`,
        `let ${axis}d3 = ${c(1, 3)}`,
      ];
    }),
  ],
  pair: (point) => [
    'let v = rest * nodes[count - 1 - j]', 'let w = wu * weights[j]', 'let v2 = v * v', 'let vd2 = 2 * v', 'let vd3 = 3 * v2', 'let vd4 = 4 * v * v2',
    ...evenAndOdd(point, (a) => ({
      e: `${a}a0 + v2 * (${a}a2 + v2 * ${a}a4)`, o: `v * (${a}a1 + v2 * ${a}a3)`, ue: `${a}d0 + v2 * ${a}d2`, uo: `v * (${a}d1 + v2 * ${a}d3)`,
      ve: `${a}a1 + vd3 * ${a}a3`, vo: `vd2 * ${a}a2 + vd4 * ${a}a4`,
    })),
  ],
};

export const SHAPES = [bicubic, biquadratic, triangle];

/** One of the two nodes of a pair. */
export const side = (tag, sign, point) => perAxis((axis) => [
  ...(point ? [`let ${axis}${tag} = ${axis}e ${sign} ${axis}o`] : []),
  `let ${axis}u${tag} = ${axis}ue ${sign} ${axis}uo`, `let ${axis}v${tag} = ${axis}ve ${sign} ${axis}vo`,
]);

/** The node in the middle of the line, where v is 0. */
export const middle = (point) => [
  'let w = wu * weights[half]',
  ...perAxis((axis) => [...(point ? [`let ${axis}m = ${axis}a0`] : []), `let ${axis}um = ${axis}d0`, `let ${axis}vm = ${axis}a1`]),
];

/** X_u × X_v of a node. */
export const normal = (t) => [
  `let nx${t} = yu${t} * zv${t} - zu${t} * yv${t}`, `let ny${t} = zu${t} * xv${t} - xu${t} * zv${t}`, `let nz${t} = xu${t} * yv${t} - yu${t} * xv${t}`,
];

const products = (t) => [
  ...normal(t),
  ...AXES.map((axis) => `let p${axis}${t} = ${axis}${t} * n${axis}${t}`),
  `let d${t} = w * (px${t} + py${t} + pz${t})`,
  `let a${t} = w * sqrt(nx${t} * nx${t} + ny${t} * ny${t} + nz${t} * nz${t})`,
  ...['d', 'a'].flatMap((weight) => AXES.map((axis) => `let ${weight}${axis}${t} = ${weight}${t} * ${axis}${t}`)),
];

/** One node or the two of a pair, named by their tags: everything into the sums, once for both, since there are more sums than a processor has registers. */
export const moments = (...tags) => {
  const both = (write) => tags.map(write).join(' + ');
  return [
    ...tags.flatMap(products),
    `magnitude += w * (${both((t) => `abs(px${t}) + abs(py${t}) + abs(pz${t})`)})`,
    ...[['m', 'd'], ['s', 'a']].flatMap(([sum, weight]) => SUMS.map((name) => {
      if (name.length < 2) return `${sum}${name} += (${both((t) => `${weight}${name}${t}`)})`;
      return `${sum}${name} += (${both((t) => `${weight}${name[0]}${t} * ${name[1]}${t}`)})`;
    })),
  ];
};

/** The same for the area alone. */
export const area = (...tags) => [
  ...tags.flatMap(normal),
  `s += w * (${tags.map((t) => `sqrt(nx${t} * nx${t} + ny${t} * ny${t} + nz${t} * nz${t})`).join(' + ')})`,
];
