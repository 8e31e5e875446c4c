// Writes the two kernels of regular bicubic patches from one list of operations, so that both do the same in the same order:
// lib/engine/kernel/bicubic-scalar.ts (one patch at a time) and lib/engine/kernel/bicubic-bytes.ts (AssemblyScript compiled to
// WebAssembly, two patches a vector). With --check it only says whether the committed files are what it would write.
import { readFile, writeFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import asc from 'assemblyscript/asc';

const AXES = ['x', 'y', 'z'];
const SUMS = ['', 'x', 'y', 'z', 'xx', 'yy', 'zz', 'xy', 'xz', 'yz'];
const DIVISORS = [3, 4, 4, 4, 5, 5, 5, 5, 5, 5];

/** Reads an expression of + - * / ( ) abs( ) sqrt( ), names, numbers and p[…] into a tree. */
function parse(text) {
  const tokens = text.match(/[A-Za-z_]\w*(\[[^\]]*\])?|\d+|[-+*/()]/g);
  let at = 0;
  const level = (operators, below) => () => {
    let left = below();
    while (operators.includes(tokens[at])) left = { operator: tokens[at++], left, right: below() };
    return left;
  };
  const factor = () => {
    const token = tokens[at++];
    if (token === '(') {
      const inner = sum();
      at++;
      return inner;
    }
    if (tokens[at] === '(' && (token === 'abs' || token === 'sqrt')) {
      at++;
      const inner = sum();
      at++;
      return { call: token, inner };
    }
    return { leaf: token };
  };
  const sum = level('+-', level('*/', factor));
  return sum();
}

const scalar = {
  leaf: (text) => text,
  binary: (left, operator, right) => `(${left} ${operator} ${right})`,
  call: (name, inner) => `Math.${name}(${inner})`,
  declare: (name, value) => `const ${name} = ${value};`,
  start: (name) => `let ${name} = 0;`,
  store: (target, value) => `${target} = ${value};`,
};

const NAMES = { '+': 'add', '-': 'sub', '*': 'mul', '/': 'div' };
const vector = {
  leaf(text) {
    if (/^\d+$/.test(text)) return `f64x2.splat(${text})`;
    const [, array, index] = text.match(/^(\w+)\[(.*)\]$/) ?? [];
    if (array === undefined) return text;
    return array === 'p' ? `v128.load(p + ((${index}) << 4))` : `v128.load64_splat(${array} + ((${index}) << 3))`;
  },
  binary: (left, operator, right) => `f64x2.${NAMES[operator]}(${left}, ${right})`,
  call: (name, inner) => `f64x2.${name}(${inner})`,
  declare: (name, value) => `const ${name}: v128 = ${value};`,
  start: (name) => `let ${name}: v128 = f64x2.splat(0);`,
  store(target, value) {
    const [, array, index] = target.match(/^(\w+)\[(.*)\]$/) ?? [];
    return array === undefined ? `${target} = ${value};` : `v128.store(${array} + ((${index}) << 4), ${value});`;
  },
};

function print(dialect, text) {
  const write = (tree) => {
    if (tree.leaf !== undefined) return dialect.leaf(tree.leaf);
    if (tree.call !== undefined) return dialect.call(tree.call, write(tree.inner));
    return dialect.binary(write(tree.left), tree.operator, write(tree.right));
  };
  const written = write(parse(text));
  return dialect === scalar ? written.replace(/^\((.*)\)$/, (whole, inner) => (balanced(inner) ? inner : whole)) : written;
}

function balanced(text) {
  let depth = 0;
  for (const letter of text) {
    if (letter === '(') depth++;
    if (letter === ')' && --depth < 0) return false;
  }
  return true;
}

/** `let name = expression`, `name := expression` for a store, `name += expression`. */
function statements(dialect, lines) {
  return lines.map((line) => {
    const declared = line.match(/^let (\w+) = (.*)$/);
    if (declared) return dialect.declare(declared[1], print(dialect, declared[2]));
    const [, target, operator, value] = line.match(/^(.+?) (:=|\+=) (.*)$/);
    return dialect.store(target, print(dialect, operator === '+=' ? `${target} + ${value}` : value));
  });
}

/** B-spline values to powers of t − ½, as lib/engine/patches/bicubic-powers.ts does it. */
const toPowers = [
  'let c0 = p[at]', 'let c1 = p[at + stride]', 'let c2 = p[at + 2 * stride]', 'let c3 = p[at + 3 * stride]',
  'let s0 = c0 + c3', 'let s1 = c1 + c2', 'let d0 = c3 - c0', 'let d1 = c2 - c1',
  'p[at] := (s0 + 23 * s1) / 48', 'p[at + stride] := (d0 + 5 * d1) / 8', 'p[at + 2 * stride] := (s0 - s1) / 4', 'p[at + 3 * stride] := (d0 - 3 * d1) / 6',
];

/** The line u = const: coefficients in v of X (a) and X_u (d). */
const line = [
  'let u = nodes[i]', 'let wu = weights[i]', 'let u2 = u * u', 'let ud2 = 2 * u', 'let ud3 = 3 * u2',
  ...AXES.flatMap((axis, k) => [0, 1, 2, 3].flatMap((j) => {
    const q = [0, 1, 2, 3].map((power) => `p[${12 * power + 3 * j + k}]`);
    return [
      `let ${axis}a${j} = (${q[0]} + u2 * ${q[2]}) + u * (${q[1]} + u2 * ${q[3]})`,
      `let ${axis}d${j} = ${q[1]} + ud2 * ${q[2]} + ud3 * ${q[3]}`,
    ];
  })),
];

/** Even and odd parts in v, shared by ±v. */
const pair = (withPoint) => [
  'let v = nodes[count - 1 - j]', 'let w = wu * weights[j]', 'let v2 = v * v', 'let vd2 = 2 * v', 'let vd3 = 3 * v2',
  ...AXES.flatMap((axis) => [
    ...(withPoint ? [`let ${axis}e = ${axis}a0 + v2 * ${axis}a2`, `let ${axis}o = v * (${axis}a1 + v2 * ${axis}a3)`] : []),
    `let ${axis}ue = ${axis}d0 + v2 * ${axis}d2`, `let ${axis}uo = v * (${axis}d1 + v2 * ${axis}d3)`,
    `let ${axis}ve = ${axis}a1 + vd3 * ${axis}a3`, `let ${axis}vo = vd2 * ${axis}a2`,
  ]),
];

const side = (tag, sign, withPoint) => AXES.flatMap((axis) => [
  ...(withPoint ? [`let ${axis}${tag} = ${axis}e ${sign} ${axis}o`] : []),
  `let ${axis}u${tag} = ${axis}ue ${sign} ${axis}uo`, `let ${axis}v${tag} = ${axis}ve ${sign} ${axis}vo`,
]);

const middle = (withPoint) => [
  'let w = wu * weights[half]',
  ...AXES.flatMap((axis) => [...(withPoint ? [`let ${axis}m = ${axis}a0`] : []), `let ${axis}um = ${axis}d0`, `let ${axis}vm = ${axis}a1`]),
];

const normal = (t) => [
  `let nx${t} = yu${t} * zv${t} - zu${t} * yv${t}`, `let ny${t} = zu${t} * xv${t} - xu${t} * zv${t}`, `let nz${t} = xu${t} * yv${t} - yu${t} * xv${t}`,
];

/** One node: everything into the sums. */
const moments = (t) => [
  ...normal(t),
  ...AXES.map((axis) => `let p${axis}${t} = ${axis}${t} * n${axis}${t}`),
  `let d${t} = w * (px${t} + py${t} + pz${t})`,
  `magnitude += w * (abs(px${t}) + abs(py${t}) + abs(pz${t}))`,
  `let a${t} = w * sqrt(nx${t} * nx${t} + ny${t} * ny${t} + nz${t} * nz${t})`,
  ...[['m', 'd'], ['s', 'a']].flatMap(([sum, weight]) => [
    ...AXES.map((axis) => `let ${weight}${axis}${t} = ${weight}${t} * ${axis}${t}`),
    ...SUMS.map((name) => {
      if (name.length === 0) return `${sum} += ${weight}${t}`;
      if (name.length === 1) return `${sum}${name} += ${weight}${name}${t}`;
      return `${sum}${name} += ${weight}${name[0]}${t} * ${name[1]}${t}`;
    }),
  ]),
];

const area = (t) => [...normal(t), `s += w * sqrt(nx${t} * nx${t} + ny${t} * ny${t} + nz${t} * nz${t})`];

/** Both kernels' loops over all nodes. */
function nodeLoops(dialect, node, withPoint, integer) {
  const write = (lines, depth) => statements(dialect, lines).map((text) => `${'  '.repeat(depth)}${text}`).join('\n');
  const lineOf = withPoint ? line : line.filter((text) => !/^let [xyz]a0 /.test(text));
  return `  const half${integer} = count >> 1;
  for (let i${integer} = 0; i < count; i++) {
${write(lineOf, 2)}
    for (let j${integer} = 0; j < half; j++) {
${write([...pair(withPoint), ...side('l', '+', withPoint), ...node('l'), ...side('r', '-', withPoint), ...node('r')], 3)}
    }
    if ((count & 1) === 1) {
${write([...middle(withPoint), ...node('m')], 3)}
    }
  }`;
}

const sums = (letter) => SUMS.map((name) => `${letter}${name}`);
const start = (dialect, names) => names.map((name) => `  ${dialect.start(name)}`).join('\n');

function scalarSource() {
  const put = (array, letter, divisors) => SUMS.map((name, i) => `  ${array}[${i}] = ${letter}${name}${divisors ? ` / ${DIVISORS[i]}` : ''};`).join('\n');
  return `import type { GaussRule } from '../patches/gauss-rule';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

/**
 * Ten solid and ten surface moments of the patch with the power coefficients \`p\`, about the point that they are relative to.
 * Returns ∮ (|x n_x| + |y n_y| + |z n_z|)/3.
 */
export function powerMoments(p: Float64Array, rule: GaussRule, solid: Float64Array, surface: Float64Array): number {
  const { nodes, weights } = rule;
  const count = nodes.length;
${start(scalar, ['magnitude', ...sums('m'), ...sums('s')])}
${nodeLoops(scalar, moments, true, '')}
${put('solid', 'm', true)}
${put('surface', 's', false)}
  return magnitude / 3;
}

/** Area of the patch with the power coefficients \`p\` by a rule. */
export function powerArea(p: Float64Array, rule: GaussRule): number {
  const { nodes, weights } = rule;
  const count = nodes.length;
  let s = 0;
${nodeLoops(scalar, area, false, '')}
  return s;
}
`;
}

/** Layout as lib/engine/kernel/patch-batch.ts has it: per pair 48 net values and 3 origin values, two lanes each; 22 results. */
function vectorSource() {
  const put = (letter, first, divisors) => SUMS.map((name, i) => `  v128.store(out + ${16 * (first + i)}, ${divisors ? `f64x2.div(${letter}${name}, f64x2.splat(${DIVISORS[i]}))` : `${letter}${name}`});`).join('\n');
  return `
function toPowers(p: i32, at: i32, stride: i32): void {
${statements(vector, toPowers).map((text) => `  ${text}`).join('\n')}
}

function moments(p: i32, count: i32, nodes: i32, weights: i32, out: i32): void {
${start(vector, ['magnitude', ...sums('m'), ...sums('s')])}
${nodeLoops(vector, moments, true, ': i32')}
${put('m', 0, true)}
${put('s', 10, false)}
  v128.store(out + 320, f64x2.div(magnitude, f64x2.splat(3)));
}

function area(p: i32, count: i32, nodes: i32, weights: i32, out: i32): void {
  let s: v128 = f64x2.splat(0);
${nodeLoops(vector, area, false, ': i32')}
  v128.store(out, s);
}

export function run(pairs: i32, input: i32, output: i32, count: i32, nodes: i32, coarseCount: i32, coarseNodes: i32, scratch: i32): void {
  for (let k: i32 = 0; k < pairs; k++) {
    for (let i: i32 = 0; i < 768; i += 16) v128.store(scratch + i, v128.load(input + i));
    for (let axis: i32 = 0; axis < 3; axis++) {
      for (let i: i32 = 0; i < 4; i++) toPowers(scratch, 12 * i + axis, 3);
      for (let j: i32 = 0; j < 4; j++) toPowers(scratch, 3 * j + axis, 12);
    }
    for (let i: i32 = 0; i < 48; i += 16) v128.store(scratch + i, f64x2.sub(v128.load(scratch + i), v128.load(input + 768 + i)));
    moments(scratch, count, nodes, nodes + (count << 3), output);
    if (coarseCount > 0) area(scratch, coarseCount, coarseNodes, coarseNodes + (coarseCount << 3), output + 336);
    input += 816;
    output += 352;
  }
}
`;
}

async function compile(source) {
  let bytes = null;
  const { error, stderr } = await asc.main(
    ['kernel.ts', '--outFile', 'kernel.wasm', '-O3', '--noAssert', '--runtime', 'stub', '--enable', 'simd', '--initialMemory', '6', '--maximumMemory', '6'],
    { readFile: (name) => (name === 'kernel.ts' ? source : null), writeFile: (name, contents) => void (name === 'kernel.wasm' && (bytes = contents)), listFiles: () => [] },
  );
  if (error !== null || bytes === null) throw new Error(`the kernel does not compile: ${error?.message ?? ''} ${stderr.toString()}`);
  return bytes;
}

function bytesSource(bytes) {
  const lines = Buffer.from(bytes).toString('base64').match(/.{1,120}/g);
  return `// Written by lib/run/build-kernel.mjs: the vector kernel as WebAssembly, kept in the source so that server, threads and browser have it without a request.

/** Base64 of the module. */
export const BICUBIC_BYTES = [
${lines.map((text) => `  '${text}',`).join('\n')}
].join('');
`;
}

const files = { 'bicubic-scalar.ts': scalarSource(), 'bicubic-bytes.ts': bytesSource(await compile(vectorSource())) };
let differing = 0;
for (const [name, text] of Object.entries(files)) {
  const path = fileURLToPath(new URL(`../engine/kernel/${name}`, import.meta.url));
  if (process.argv.includes('--check')) {
    if ((await readFile(path, 'utf8').catch(() => '')) === text) continue;
    differing++;
    console.log(`lib/engine/kernel/${name} is not what the generator writes; run npm run build:kernel`);
  } else await writeFile(path, text);
}
if (differing > 0) process.exitCode = 1;
