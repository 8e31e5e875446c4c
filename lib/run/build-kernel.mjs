// Writes the kernels of regular patches, each from one list of operations, so that both do the same in the same order: lib/engine/kernel/*-scalar.ts
// (one patch at a time) and lib/engine/kernel/kernel-bytes.ts (AssemblyScript compiled to WebAssembly, two patches a vector).
// With --check it only says whether the committed files are what it would write.
import { readFile, writeFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import asc from 'assemblyscript/asc';
import { FAN_ROUTINES } from './support/fan-routines.mjs';
import { variationOf } from './support/kernel-bends.mjs';
import { boundsOf, CALM_VARIATION, nodesOf, VARIATION_AT } from './support/kernel-bounds.mjs';
import { scalar, statements, vector } from './support/kernel-dialects.mjs';
import { shellScalarSource, shellVectorSource } from './support/shell-kernel.mjs';
import { area, AXES, DIVISORS, middle, moments, SHAPES, side, SUMS } from './support/kernel-shapes.mjs';

const lines = (dialect, list, depth) => statements(dialect, list).map((text) => `${'  '.repeat(depth)}${text}`).join('\n');

/** How much a patch's normal vector varies, block by block, to `bends`. */
function variationLines(dialect, shape) {
  const { middle: first, corners, last } = variationOf(shape);
  return `${lines(dialect, first, 1)}
  ${dialect.start('most')}
${corners.map((list) => `  {\n${lines(dialect, list, 2)}\n  }`).join('\n')}
${lines(dialect, last, 1)}`;
}

/** The vector kernel's loops over all nodes. */
function nodeLoops(shape, node, point) {
  return `  const half: i32 = count >> 1;
  for (let i: i32 = 0; i < ${shape.alongCount}; i++) {
${lines(vector, shape.line(point), 2)}
    for (let j: i32 = 0; j < half; j++) {
${lines(vector, [...shape.pair(point), ...side('l', '+', point), ...side('r', '-', point), ...node('l', 'r')], 3)}
    }
    if ((count & 1) === 1) {
${lines(vector, [...middle(point), ...node('m')], 3)}
    }
  }`;
}

const sums = (letter) => SUMS.map((name) => `${letter}${name}`);
const start = (dialect, names) => names.map((name) => `  ${dialect.start(name)}`).join('\n');
const capital = (name) => `${name[0].toUpperCase()}${name.slice(1)}`;

/** The triangle's twelve points to its fifteen coefficients, by the table of their weights. */
const triangleSums = AXES.map((axis, k) => [axis, k]);

/** In JavaScript a node's values and the sums stand in arrays, so that one piece of code adds up for all shapes. */
const PARTS = AXES.flatMap((axis) => ['e', 'o', 'ue', 'uo', 've', 'vo'].map((part) => `${axis}${part}`));
const WEIGHT_AT = PARTS.length;
const TOTALS = ['magnitude', ...sums('m'), ...sums('s')];

/** What the lines declare of a node goes to the array instead. */
const toNode = (list) => list.map((text) => {
  const [, name, value] = text.match(/^let (\w+) = (.*)$/);
  const part = PARTS.indexOf(name.replace(/^([xyz])([uv]?)m$/, '$1$2e'));
  if (name !== 'w' && part < 0) return text;
  return `node[${name === 'w' ? WEIGHT_AT : part}] := ${value}`;
});

/** And the totals are those in the array. */
const toTotals = (list) => list.map((text) => {
  const [, name, value] = text.match(/^(\w+) \+= (.*)$/) ?? [];
  return name === undefined ? text : `totals[${TOTALS.indexOf(name)}] += ${value}`;
});

const HEADER = '// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.';

function scalarSource(shape) {
  const two = shape.alongNodes !== 'nodes';
  return `import type { GaussRule } from '../patches/gauss-rule';
import type { NodeSums } from './node-sums';

${HEADER}

const node = new Float64Array(${WEIGHT_AT + 1});

function larger(left: number, right: number): number {
  return left < right ? right : left;
}

/** Visits the nodes of a ${shape.name} patch with the power coefficients \`p\` and lets \`sums\` add them to \`totals\`. */
export function ${shape.name}Nodes(p: Float64Array, ${two ? 'along: GaussRule, rule' : '_along: GaussRule, rule'}: GaussRule, sums: NodeSums, totals: Float64Array): void {
  const { nodes, weights } = rule;
${two ? '  const alongNodes = along.nodes;\n  const alongWeights = along.weights;\n' : ''}  const count = nodes.length;
  const half = count >> 1;
  for (let i = 0; i < ${shape.alongCount}; i++) {
${lines(scalar, shape.line(true), 2)}
    for (let j = 0; j < half; j++) {
${lines(scalar, toNode(shape.pair(true)), 3)}
      sums.addPair(node, totals);
    }
    if ((count & 1) === 1) {
${lines(scalar, toNode(middle(true)), 3)}
      sums.addMiddle(node, totals);
    }
  }
}

/** Bounds of what rules with fewer nodes than the exact one leave out, as lib/run/support/kernel-bounds.mjs says, to \`bounds\`: the limit, a norm, then one a rule. */
export function ${shape.name}Bounds(p: Float64Array, tolerance: number, reach: number, bounds: Float64Array): void {
${lines(scalar, boundsOf(shape.name), 1)}
}

/** Puts the square of the most that X_u × X_v differs at a corner from the middle, relative to its length there, into \`bends\`. */
export function ${shape.name}Variation(p: Float64Array, bends: Float64Array): void {
${variationLines(scalar, shape)}
}
`;
}

/** What is added at a node, for all shapes. */
function nodeSumsSource() {
  const unpack = (names) => names.map((name) => `  const ${name} = node[${PARTS.indexOf(name)}];`).join('\n');
  const pairOf = (node, point) => `${unpack(PARTS.filter((name) => point || name.length > 2))}
  const w = node[${WEIGHT_AT}];
${lines(scalar, toTotals([...side('l', '+', point), ...side('r', '-', point), ...node('l', 'r')]), 1)}`;
  const middleOf = (node, point) => `${AXES.flatMap((axis) => (point ? ['', 'u', 'v'] : ['u', 'v']).map((part) => `  const ${axis}${part}m = node[${PARTS.indexOf(`${axis}${part}e`)}];`)).join('\n')}
  const w = node[${WEIGHT_AT}];
${lines(scalar, toTotals(node('m')), 1)}`;
  const sumsOf = (name, comment, node, point) => `/** ${comment} */
export const ${name}: NodeSums = { addPair: ${name}Pair, addMiddle: ${name}Middle };

function ${name}Pair(node: Float64Array, totals: Float64Array): void {
${pairOf(node, point)}
}

function ${name}Middle(node: Float64Array, totals: Float64Array): void {
${middleOf(node, point)}
}
`;
  return `${HEADER}

/** Totals: magnitude, ten solid and ten surface moments. */
export const TOTALS = ${TOTALS.length};

/** Adds what two nodes ±v (in even and odd parts) or one in the middle contribute. A node is, per axis, position, ∂u and ∂v, even and odd part each; then the weight. */
export interface NodeSums {
  addPair(node: Float64Array, totals: Float64Array): void;
  addMiddle(node: Float64Array, totals: Float64Array): void;
}

${sumsOf('MOMENT_SUMS', 'All totals.', moments, true)}
${sumsOf('AREA_SUMS', 'The area alone, which is the first surface moment.', area, false)}`.replaceAll(/\b(MOMENT|AREA)_SUMS(Pair|Middle)/g, (_, kind, what) => `add${kind === 'MOMENT' ? 'Moments' : 'Area'}Of${what}`);
}

/** How a pair's net at \`input\` becomes powers at \`scratch\`. */
function powersOf(shape) {
  if (shape.name !== 'triangle') {
    const step = 3 * shape.order;
    return `    for (let i: i32 = 0; i < ${16 * shape.values}; i += 16) v128.store(scratch + i, v128.load(input + i));
    for (let axis: i32 = 0; axis < 3; axis++) {
      for (let i: i32 = 0; i < ${shape.order}; i++) ${shape.name}Powers(scratch, ${step} * i + axis, 3);
      for (let j: i32 = 0; j < ${shape.order}; j++) ${shape.name}Powers(scratch, 3 * j + axis, ${step});
    }`;
  }
  return '    trianglePowers(input, scratch, table);';
}

function powersSource(shape) {
  const write = (list, depth) => lines(vector, list, depth);
  if (shape.name !== 'triangle') return `@inline function ${shape.name}Powers(p: i32, at: i32, stride: i32): void {\n${write(shape.toPowers, 1)}\n}`;
  return `function trianglePowers(net: i32, p: i32, table: i32): void {
  for (let m: i32 = 0; m < 15; m++) {
${triangleSums.map(([name]) => `    ${vector.start(name)}`).join('\n')}
    for (let k: i32 = 0; k < 12; k++) {
${write(['let weight = table[12 * m + k]', ...triangleSums.map(([name, axis]) => `${name} += weight * net[3 * k + ${axis}]`)], 3)}
    }
${write(triangleSums.map(([name, axis]) => `p[3 * m + ${axis}] := ${name}`), 2)}
  }
}`;
}

/** Doubles of a rule's place in the kernel's memory, bytes of a pair's results, and where its powers' bounds stand after them; as lib/engine/kernel/vector-kernel.ts has it. */
const RULE_BYTES = 160;
const RESULT_BYTES = 416;
const BOUNDS_AT = 768;

/** Layout as lib/engine/kernel/vector-kernel.ts has it: per pair the net's values and 3 of the origin, two lanes each; 26 results. */
function vectorSource(shape) {
  const put = (letter, first, divisors) => SUMS.map((name, i) => `  v128.store(out + ${16 * (first + i)}, ${divisors ? `f64x2.div(${letter}${name}, f64x2.splat(${DIVISORS[i]}))` : `${letter}${name}`});`).join('\n');
  const extra = shape.alongCount === 'count' ? 0 : 1;
  const rules = `rules: i32, count: i32`;
  const places = `  const nodes: i32 = rules + ${RULE_BYTES} * count;
  const weights: i32 = nodes + (count << 3);
${extra === 0 ? '' : `  const alongNodes: i32 = nodes + ${RULE_BYTES};\n  const alongWeights: i32 = alongNodes + ((count + 1) << 3);\n`}`;
  const { fewest, exact } = nodesOf(shape.name);
  return `
${powersSource(shape)}

function ${shape.name}Moments(p: i32, ${rules}, out: i32): void {
${places}${start(vector, ['magnitude', ...sums('m'), ...sums('s')])}
${nodeLoops(shape, moments, true)}
${put('m', 0, true)}
${put('s', 10, false)}
  v128.store(out + 320, f64x2.div(magnitude, f64x2.splat(3)));
}

function ${shape.name}Area(p: i32, ${rules}, out: i32): void {
${places}  let s: v128 = f64x2.splat(0);
${nodeLoops(shape, area, false)}
  v128.store(out, s);
}

function ${shape.name}Bounds(p: i32, tolerance: v128, reach: v128, bounds: i32): void {
${lines(vector, boundsOf(shape.name), 1)}
}

function ${shape.name}Variation(p: i32, bends: i32): void {
${variationLines(vector, shape)}
}

export function run${capital(shape.name)}(
  pairs: i32, input: i32, output: i32, fewest: i32, most: i32, coarse: i32, forArea: i32, cutoff: f64, near: f64, calm: f64, tolerance: f64, reach: f64, rules: i32, table: i32, scratch: i32,
): void {
  const bounds = scratch + ${BOUNDS_AT};
  let start = fewest;
  for (let k: i32 = 0; k < pairs; k++) {
${powersOf(shape)}
    for (let i: i32 = 0; i < ${16 * AXES.length}; i += 16) v128.store(scratch + i, f64x2.sub(v128.load(scratch + i), v128.load(input + ${16 * shape.values} + i)));
    let nodes = fewest;
    let second: v128 = f64x2.splat(0);
    let first: v128 = f64x2.splat(0);
    if (tolerance > 0) {
      ${shape.name}Bounds(scratch, f64x2.splat(tolerance), f64x2.splat(reach), bounds);
      const limit = v128.load(bounds);
      while (nodes < ${exact} && !i64x2.all_true(f64x2.le(v128.load(bounds + ((nodes - ${fewest - 2}) << 4)), limit))) nodes++;
      if (nodes < ${exact}) {
        const left = v128.load(bounds + ((nodes - ${fewest - 2}) << 4));
        second = f64x2.div(left, f64x2.splat(5));
        first = f64x2.div(left, f64x2.mul(f64x2.splat(4), v128.load(bounds + 16)));
      }
    }
    nodes = max(nodes, start);
    if (coarse > 0 || fewest < most) {
      if (tolerance > 0 && i64x2.all_true(f64x2.le(v128.load(bounds + ${16 * VARIATION_AT}), f64x2.splat(${CALM_VARIATION})))) v128.store(output + 400, v128.load(bounds + ${16 * VARIATION_AT}));
      else ${shape.name}Variation(scratch, output + 400);
    }
    ${shape.name}Moments(scratch, rules, nodes, output);
    if (fewest === most) {
      if (coarse > 0) ${shape.name}Area(scratch, rules, coarse, output + 336);
    } else {
      ${shape.name}Area(scratch, rules, coarseOf(nodes, ${extra}), output + 336);
      while (!agree(output, cutoff)) {
        const close = agree(output, near);
        if (nodes < forArea) nodes = close ? after(nodes, ${extra}, most) : forArea;
        else if (nodes < most && close) nodes = after(nodes, ${extra}, most);
        else break;
        ${shape.name}Moments(scratch, rules, nodes, output);
        ${shape.name}Area(scratch, rules, coarseOf(nodes, ${extra}), output + 336);
      }
      start = nodes >= forArea && !agree(output, calm) ? forArea : fewest;
    }
    v128.store(output + 352, second);
    v128.store(output + 368, first);
    v128.store(output + 384, f64x2.splat(<f64>nodes));
    input += ${16 * (shape.values + 3)};
    output += ${RESULT_BYTES};
  }
}
`;
}

/** Nodes whose area that by \`nodes\` is compared with, and whether the two agree; as lib/engine/kernel/patch-kinds.ts and scalar-kernel.ts have it. */
const CHECKS = `
function coarseOf(nodes: i32, extra: i32): i32 {
  return (5 * (nodes + extra)) / 8 - extra;
}

function after(nodes: i32, extra: i32, most: i32): i32 {
  const coarse = coarseOf(nodes, extra);
  while (nodes < most && coarseOf(nodes, extra) === coarse) nodes++;
  return nodes;
}

@inline
function larger(left: v128, right: v128): v128 {
  return f64x2.pmax(left, right);
}

function agree(output: i32, cutoff: f64): bool {
  const fine = v128.load(output + 160);
  return i64x2.all_true(f64x2.le(f64x2.abs(f64x2.sub(fine, v128.load(output + 336))), f64x2.mul(f64x2.splat(cutoff), fine)));
}
`;

async function compile(source) {
  let bytes = null;
  const { error, stderr } = await asc.main(
    ['kernel.ts', '--outFile', 'kernel.wasm', '-O3', '--noAssert', '--runtime', 'stub', '--enable', 'simd', '--initialMemory', '24', '--maximumMemory', '24'],
    { readFile: (name) => (name === 'kernel.ts' ? source : null), writeFile: (name, contents) => void (name === 'kernel.wasm' && (bytes = contents)), listFiles: () => [] },
  );
  if (error !== null || bytes === null) throw new Error(`the kernel does not compile: ${error?.message ?? ''} ${stderr.toString()}`);
  return bytes;
}

function bytesSource(bytes, what = 'the vector kernels', name = 'KERNEL_BYTES') {
  const pieces = Buffer.from(bytes).toString('base64').match(/.{1,120}/g);
  return `// Written by lib/run/build-kernel.mjs: ${what} as WebAssembly, kept in the source so that server, threads and browser have them without a request.

/** Base64 of the module. */
export const ${name} = [
${pieces.map((text) => `  '${text}',`).join('\n')}
].join('');
`;
}

const files = Object.fromEntries([
  ...SHAPES.map((shape) => [`${shape.name}-scalar.ts`, scalarSource(shape)]),
  ['node-sums.ts', nodeSumsSource()],
  ['kernel-bytes.ts', bytesSource(await compile(CHECKS + SHAPES.map(vectorSource).join('') + FAN_ROUTINES))],
  ['../shell/shell-scalar.ts', shellScalarSource(HEADER)],
  ['../shell/shell-bytes.ts', bytesSource(await compile(shellVectorSource(powersSource, powersOf)), 'the vector kernels of walls', 'SHELL_BYTES')],
]);
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
