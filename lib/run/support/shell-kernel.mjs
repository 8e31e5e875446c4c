// What lib/run/build-kernel.mjs writes for walls: curvature terms of patches, in the dialects of the moments' kernels.
import { FAN_ROUTINES } from './fan-routines.mjs';
import { headless, looksOf } from './kernel-bends.mjs';
import { pruned, scalar, statements, vector } from './kernel-dialects.mjs';
import { AXES, middle, normal, SHAPES, side } from './kernel-shapes.mjs';

const lines = (dialect, list, depth) => statements(dialect, list).map((text) => `${'  '.repeat(depth)}${text}`).join('\n');
const perAxis = (write) => AXES.flatMap((axis, k) => write(axis, k));
const numbered = (count) => Array.from({ length: count }, (_, i) => i);

/** Terms as lib/engine/shell/shell-terms.ts orders them, all with a plus sign; then twice the largest inward curvature and twice the largest modulus. */
const TERMS = 35;
const TOTALS = [...numbered(TERMS).map((i) => `t${i}`), 'inward', 'curved'];

/** Second derivatives along u on the line u = const: coefficients b in v. */
const SECOND_LINES = {
  bicubic: ['let ud6 = 6 * u', ...perAxis((axis, k) => numbered(4).map((j) => `let ${axis}b${j} = 2 * p[${24 + 3 * j + k}] + ud6 * p[${36 + 3 * j + k}]`))],
  biquadratic: perAxis((axis, k) => numbered(3).map((j) => `let ${axis}b${j} = 2 * p[${18 + 3 * j + k}]`)),
  triangle: ['let ud6 = 6 * u', 'let ud12 = 12 * u2', ...perAxis((axis, k) => {
    const c = (i, j) => `p[${3 * (((i + j) * (i + j + 1)) / 2 + j) + k}]`;
    return [`let ${axis}b0 = 2 * ${c(2, 0)} + ud6 * ${c(3, 0)} + ud12 * ${c(4, 0)}`, `let ${axis}b1 = 2 * ${c(2, 1)} + ud6 * ${c(3, 1)}`, `let ${axis}b2 = 2 * ${c(2, 2)}`];
  })],
};

/** Second derivatives of a pair of nodes in even and odd parts. */
const SECOND_PAIRS = {
  bicubic: ['let vd6 = 6 * v', ...perAxis((a) => [
    `let ${a}uue = ${a}b0 + v2 * ${a}b2`, `let ${a}uuo = v * (${a}b1 + v2 * ${a}b3)`, `let ${a}uve = ${a}d1 + vd3 * ${a}d3`, `let ${a}uvo = vd2 * ${a}d2`,
    `let ${a}vve = 2 * ${a}a2`, `let ${a}vvo = vd6 * ${a}a3`,
  ])],
  biquadratic: perAxis((a) => [
    `let ${a}uue = ${a}b0 + v2 * ${a}b2`, `let ${a}uuo = v * ${a}b1`, `let ${a}uve = ${a}d1`, `let ${a}uvo = vd2 * ${a}d2`, `let ${a}vve = 2 * ${a}a2`, `let ${a}vvo = 0`,
  ]),
  triangle: ['let vd6 = 6 * v', 'let vd12 = 12 * v2', ...perAxis((a) => [
    `let ${a}uue = ${a}b0 + v2 * ${a}b2`, `let ${a}uuo = v * ${a}b1`, `let ${a}uve = ${a}d1 + vd3 * ${a}d3`, `let ${a}uvo = vd2 * ${a}d2`,
    `let ${a}vve = 2 * ${a}a2 + vd12 * ${a}a4`, `let ${a}vvo = vd6 * ${a}a3`,
  ])],
};

const secondSide = (tag, sign) => perAxis((axis) => ['uu', 'uv', 'vv'].map((part) => `let ${axis}${part}${tag} = ${axis}${part}e ${sign} ${axis}${part}o`));
const secondMiddle = perAxis((axis) => [`let ${axis}uum = ${axis}b0`, `let ${axis}uvm = ${axis}d1`, `let ${axis}vvm = 2 * ${axis}a2`]);

/** Everything of a node up to A = aN + hX, B = hN + kX, C = kN and D = aX, with weight times area a, 2H times that h, K times that k. */
const curvatures = (t) => {
  const dot = (p, q) => AXES.map((axis) => `${axis}${p}${t} * ${axis}${q}${t}`).join(' + ');
  const along = (p) => AXES.map((axis) => `${axis}${p}${t} * ${axis}n${t}`).join(' + ');
  return [
    ...normal(t),
    `let area${t} = sqrt(nx${t} * nx${t} + ny${t} * ny${t} + nz${t} * nz${t})`, `let inverse${t} = inverse(area${t})`, `let square${t} = inverse${t} * inverse${t}`,
    ...AXES.map((axis) => `let ${axis}n${t} = n${axis}${t} * inverse${t}`),
    `let L${t} = ${along('uu')}`, `let M${t} = ${along('uv')}`, `let P${t} = ${along('vv')}`,
    `let E${t} = ${dot('u', 'u')}`, `let F${t} = ${dot('u', 'v')}`, `let G${t} = ${dot('v', 'v')}`,
    `let mean${t} = (2 * F${t} * M${t} - E${t} * P${t} - G${t} * L${t}) * square${t}`, `let gauss${t} = (L${t} * P${t} - M${t} * M${t}) * square${t}`,
    `let apart${t} = sqrt(abs(mean${t} * mean${t} - 4 * gauss${t}))`,
    `inward max= mean${t} + apart${t}`, `curved max= abs(mean${t}) + apart${t}`,
    `let a${t} = w * area${t}`, `let h${t} = a${t} * mean${t}`, `let k${t} = a${t} * gauss${t}`,
    ...AXES.flatMap((axis) => [
      `let ${axis}A${t} = a${t} * ${axis}n${t} + h${t} * ${axis}${t}`, `let ${axis}B${t} = h${t} * ${axis}n${t} + k${t} * ${axis}${t}`,
      `let ${axis}C${t} = k${t} * ${axis}n${t}`, `let ${axis}D${t} = a${t} * ${axis}${t}`,
    ]),
  ];
};

const PAIRS = ['xx', 'yy', 'zz', 'xy', 'xz', 'yz'];

/** What a node adds to the terms. */
const shares = (t) => {
  const pairs = (p, q, r, s) => PAIRS.map(([i, j]) => `${i}${p}${t} * ${j}${q}${t}${r === undefined ? '' : ` + ${i}${r}${t} * ${j}${s}${t}`}`);
  return [
    `h${t}`, `k${t}`, ...['A', 'B', 'C'].flatMap((name) => AXES.map((axis) => `${axis}${name}${t}`)),
    ...pairs('A', '', 'D', 'n'), ...pairs('A', 'n', 'B', ''), ...pairs('B', 'n', 'C', ''), ...pairs('C', 'n'),
  ];
};

const shellSums = (...tags) => [
  ...tags.flatMap(curvatures),
  ...numbered(TERMS).map((i) => `t${i} += ${tags.map((t) => `(${shares(t)[i]})`).join(' + ')}`),
];

/**
 * To `bends`: the square of X_u × X_v in the middle; squares of how much it turns and stretches. A triangle has its differences at the corners from the middle.
 * A square has those along each side, halved, relative to the side's mean, which is what a rule in that direction meets; and the corners' mean less the middle.
 */
function bendBlocks(dialect, shape) {
  let at = 0;
  const sumOfSquares = (write) => AXES.map((axis) => `${write(axis)} * ${write(axis)}`).join(' + ');
  const difference = (t) => [...AXES.map((axis) => `let ${axis}f${t} = n${axis}${t} - n${axis}c`), `bends[${++at}] := ${sumOfSquares((axis) => `${axis}f${t}`)}`];
  const along = (name, p, q) => [
    ...AXES.flatMap((axis) => [`let ${axis}f${name} = ${p(axis)} - ${q(axis)}`, `let ${axis}g${name} = ${p(axis)} + ${q(axis)}`]),
    `let r${name} = ${sumOfSquares((axis) => `${axis}g${name}`)}`,
    `bends[${++at}] := (${sumOfSquares((axis) => `${axis}f${name}`)}) / r${name}`,
  ];
  const [first, ...others] = looksOf(shape);
  const lineAt = (u) => [`let u = ${u}`, ...headless(shape.line(false))];
  const atMiddle = headless(middle(false));
  const whole = [...lineAt(first[0]), ...atMiddle, ...normal('m'), ...AXES.map((axis) => `let n${axis}c = n${axis}m`), `bends[0] := ${AXES.map((axis) => `n${axis}c * n${axis}c`).join(' + ')}`];
  const pairAt = (u, v) => [...lineAt(u), `let v = ${v}`, ...headless(shape.pair(false)), ...side('l', '+', false), ...side('r', '-', false), ...normal('l'), ...normal('r')];
  /** The first side's two corners wait where nothing else stands. */
  const kept = (tag, axis) => `bends[${6 + 3 * (tag === 'l' ? 0 : 1) + AXES.indexOf(axis)}]`;
  const square = ([u, v], i) => {
    const list = [...pairAt(u, v), ...along(`s${i}`, (axis) => `n${axis}l`, (axis) => `n${axis}r`)];
    if (i === 0) return [...list, ...['l', 'r'].flatMap((t) => AXES.map((axis) => `${kept(t, axis)} := n${axis}${t}`))];
    return [
      ...list, ...['l', 'r'].flatMap((t) => along(t, (axis) => `n${axis}${t}`, (axis) => kept(t, axis))),
      ...AXES.map((axis) => `let ${axis}h = (n${axis}l + n${axis}r + ${kept('l', axis)} + ${kept('r', axis)}) / 4 - n${axis}c`), `bends[${++at}] := ${sumOfSquares((axis) => `${axis}h`)}`,
    ];
  };
  const triangle = ([u, v]) => v === null ? [...lineAt(u), ...atMiddle, ...normal('m'), ...difference('m')] : [...pairAt(u, v), ...difference('l'), ...difference('r')];
  const block = shape.name === 'triangle' ? triangle : square;
  return `${lines(dialect, [...pruned([...whole, ...AXES.map((axis) => `bends[5] := n${axis}c`)]).slice(0, -3)], 1)}\n${others.map((look, i) => `  {\n${lines(dialect, pruned(block(look, i)), 2)}\n  }`).join('\n')}`;
}

const linesOf = (shape) => [...shape.line(true), ...SECOND_LINES[shape.name]];
const pairOf = (shape) => [...shape.pair(true), ...SECOND_PAIRS[shape.name]];
const middleOf = [...middle(true), ...secondMiddle];
const capital = (name) => `${name[0].toUpperCase()}${name.slice(1)}`;

/** AssemblyScript of the shells; the powers of a pair of patches and their bends are left for the terms. */
export function shellVectorSource(powersSource, powersOf) {
  return `
function inverse(value: v128): v128 {
  return v128.and(f64x2.div(f64x2.splat(1), value), f64x2.gt(value, f64x2.splat(1e-300)));
}
${SHAPES.map((shape) => `${powersSource(shape)}

function ${shape.name}Bends(p: i32, bends: i32): void {
${bendBlocks(vector, shape)}
}

export function bend${capital(shape.name)}(pairs: i32, input: i32, scratch: i32, bends: i32, table: i32): void {
  for (let k: i32 = 0; k < pairs; k++) {
${powersOf(shape)}
    for (let i: i32 = 0; i < ${16 * AXES.length}; i += 16) v128.store(scratch + i, f64x2.sub(v128.load(scratch + i), v128.load(input + ${16 * shape.values} + i)));
    ${shape.name}Bends(scratch, bends);
    input += ${16 * (shape.values + 3)};
    scratch += 768;
    bends += 192;
  }
}

function ${shape.name}Terms(p: i32, count: i32, alongNodes: i32, alongWeights: i32, nodes: i32, weights: i32, out: i32): void {
${TOTALS.map((name) => `  ${vector.start(name)}`).join('\n')}
  const half: i32 = count >> 1;
  for (let i: i32 = 0; i < ${shape.alongCount}; i++) {
${lines(vector, linesOf(shape), 2)}
    for (let j: i32 = 0; j < half; j++) {
${lines(vector, [...pairOf(shape), ...side('l', '+', true), ...side('r', '-', true), ...secondSide('l', '+'), ...secondSide('r', '-'), ...shellSums('l', 'r')], 3)}
    }
    if ((count & 1) === 1) {
${lines(vector, [...middleOf, ...shellSums('m')], 3)}
    }
  }
${TOTALS.map((name, i) => `  v128.store(out + ${16 * i}, ${name});`).join('\n')}
}

export function terms${capital(shape.name)}(pairs: i32, powers: i32, output: i32, counts: i32, rules: i32, ruleBytes: i32): void {
  for (let k: i32 = 0; k < pairs; k++) {
    const count = load<i32>(counts + (k << 2));
    if (count > 0) {
      const nodes = rules + count * ruleBytes;
      const alongCount = ${shape.alongCount};
      const along = rules + alongCount * ruleBytes;
      ${shape.name}Terms(powers, count, along, along + (alongCount << 3), nodes, nodes + (count << 3), output);
    }
    powers += 768;
    output += ${16 * TOTALS.length};
  }
}
`).join('')}${FAN_ROUTINES}`;
}

/** In JavaScript a node's values stand in an array, as in lib/engine/kernel/node-sums.ts. */
const PARTS = AXES.flatMap((axis) => ['', 'u', 'v', 'uu', 'uv', 'vv'].flatMap((part) => [`${axis}${part}e`, `${axis}${part}o`]));
const toNode = (list) => list.map((text) => {
  const [, name, value] = text.match(/^let (\w+) = (.*)$/);
  const part = PARTS.indexOf(name.replace(/^([xyz][uv]*)m$/, '$1e'));
  if (name !== 'w' && part < 0) return text;
  return `node[${name === 'w' ? PARTS.length : part}] := ${value}`;
});
const toTotals = (list) => list.map((text) => {
  const [, name, operator, value] = text.match(/^(\w+) (\+=|max=) (.*)$/) ?? [];
  return name === undefined ? text : `totals[${TOTALS.indexOf(name)}] ${operator} ${value}`;
});

/** The same in JavaScript, one patch at a time. */
export function shellScalarSource(header) {
  const unpack = (names, tag) => names.map((name) => `  const ${tag === '' ? name : `${name.slice(0, -1)}${tag}`} = node[${PARTS.indexOf(name)}];`).join('\n');
  return `import type { GaussRule } from '../patches/gauss-rule';

${header}

/** Terms of a patch, all with a plus sign, twice its largest inward curvature and twice the largest modulus of a curvature. */
export const SHELL_TOTALS = ${TOTALS.length};

const node = new Float64Array(${PARTS.length + 1});

function inverse(value: number): number {
  return value > 1e-300 ? 1 / value : 0;
}

function addPair(totals: Float64Array): void {
${unpack(PARTS, '')}
  const w = node[${PARTS.length}];
${lines(scalar, toTotals([...side('l', '+', true), ...side('r', '-', true), ...secondSide('l', '+'), ...secondSide('r', '-'), ...shellSums('l', 'r')]), 1)}
}

function addMiddle(totals: Float64Array): void {
${unpack(PARTS.filter((name) => name.endsWith('e')), 'm')}
  const w = node[${PARTS.length}];
${lines(scalar, toTotals(shellSums('m')), 1)}
}
${SHAPES.map((shape) => {
    const two = shape.alongNodes !== 'nodes';
    return `
/** Puts squares of a ${shape.name} patch's X_u × X_v and of how much it varies into \`bends\`. */
export function ${shape.name}Bends(p: Float64Array, bends: Float64Array): void {
${bendBlocks(scalar, shape)}
}

/** Adds the terms of a ${shape.name} patch with the power coefficients \`p\` to \`totals\`. */
export function ${shape.name}Terms(p: Float64Array, ${two ? 'along: GaussRule, rule' : '_along: GaussRule, rule'}: GaussRule, totals: Float64Array): void {
  const { nodes, weights } = rule;
${two ? '  const alongNodes = along.nodes;\n  const alongWeights = along.weights;\n' : ''}  const count = nodes.length;
  const half = count >> 1;
  for (let i = 0; i < ${shape.alongCount}; i++) {
${lines(scalar, linesOf(shape), 2)}
    for (let j = 0; j < half; j++) {
${lines(scalar, toNode(pairOf(shape)), 3)}
      addPair(totals);
    }
    if ((count & 1) === 1) {
${lines(scalar, toNode(middleOf), 3)}
      addMiddle(totals);
    }
  }
}
`;
  }).join('')}`;
}
