// Writes the kernels of regular patches, each from one list of operations, so that both do the same in the same order: lib/engine/kernel/*-scalar.ts
// (one patch at a time) and lib/engine/kernel/kernel-bytes.ts (AssemblyScript compiled to WebAssembly, two patches a vector).
// With --check it only says whether the committed files are what it would write.
import { readFile, writeFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import asc from 'assemblyscript/asc';
import { FAN_ROUTINES } from './support/fan-routines.mjs';
import { scalar, statements, vector } from './support/kernel-dialects.mjs';
import { area, AXES, DIVISORS, middle, moments, SHAPES, side, SUMS } from './support/kernel-shapes.mjs';

/** A kernel's loops over all nodes. */
function nodeLoops(dialect, shape, node, point, integer) {
  const write = (lines, depth) => statements(dialect, lines).map((text) => `${'  '.repeat(depth)}${text}`).join('\n');
  return `  const half${integer} = count >> 1;
  for (let i${integer} = 0; i < ${shape.alongCount}; i++) {
${write(shape.line(point), 2)}
    for (let j${integer} = 0; j < half; j++) {
${write([...shape.pair(point), ...side('l', '+', point), ...side('r', '-', point), ...node('l', 'r')], 3)}
    }
    if ((count & 1) === 1) {
${write([...middle(point), ...node('m')], 3)}
    }
  }`;
}

const sums = (letter) => SUMS.map((name) => `${letter}${name}`);
const start = (dialect, names) => names.map((name) => `  ${dialect.start(name)}`).join('\n');
const capital = (name) => `${name[0].toUpperCase()}${name.slice(1)}`;

/** The triangle's twelve points to its fifteen coefficients, by the table of their weights. */
const triangleSums = AXES.map((axis, k) => [axis, k]);

function scalarSource(shape) {
  const put = (array, letter, divisors) => SUMS.map((name, i) => `  ${array}[${i}] = ${letter}${name}${divisors ? ` / ${DIVISORS[i]}` : ''};`).join('\n');
  const two = shape.alongNodes !== 'nodes';
  const rules = two ? 'along: GaussRule, rule: GaussRule' : 'rule: GaussRule';
  const unpack = `  const { nodes, weights } = rule;\n${two ? '  const alongNodes = along.nodes;\n  const alongWeights = along.weights;\n' : ''}  const count = nodes.length;`;
  return `import type { GaussRule } from '../patches/gauss-rule';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

/**
 * Ten solid and ten surface moments of the ${shape.name} patch with the power coefficients \`p\`, about the point that they are relative to.
 * Returns ∮ (|x n_x| + |y n_y| + |z n_z|)/3.
 */
export function ${shape.name}PowerMoments(p: Float64Array, ${rules}, solid: Float64Array, surface: Float64Array): number {
${unpack}
${start(scalar, ['magnitude', ...sums('m'), ...sums('s')])}
${nodeLoops(scalar, shape, moments, true, '')}
${put('solid', 'm', true)}
${put('surface', 's', false)}
  return magnitude / 3;
}

/** Area of the patch with the power coefficients \`p\` by a rule. */
export function ${shape.name}PowerArea(p: Float64Array, ${rules}): number {
${unpack}
  let s = 0;
${nodeLoops(scalar, shape, area, false, '')}
  return s;
}
`;
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
  const write = (lines, depth) => statements(vector, lines).map((text) => `${'  '.repeat(depth)}${text}`).join('\n');
  if (shape.name !== 'triangle') return `function ${shape.name}Powers(p: i32, at: i32, stride: i32): void {\n${write(shape.toPowers, 1)}\n}`;
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

/** Layout as lib/engine/kernel/vector-kernel.ts has it: per pair the net's values and 3 of the origin, two lanes each; 22 results. */
function vectorSource(shape) {
  const put = (letter, first, divisors) => SUMS.map((name, i) => `  v128.store(out + ${16 * (first + i)}, ${divisors ? `f64x2.div(${letter}${name}, f64x2.splat(${DIVISORS[i]}))` : `${letter}${name}`});`).join('\n');
  const rules = 'count: i32, alongNodes: i32, alongWeights: i32, nodes: i32, weights: i32';
  return `
${powersSource(shape)}

function ${shape.name}Moments(p: i32, ${rules}, out: i32): void {
${start(vector, ['magnitude', ...sums('m'), ...sums('s')])}
${nodeLoops(vector, shape, moments, true, ': i32')}
${put('m', 0, true)}
${put('s', 10, false)}
  v128.store(out + 320, f64x2.div(magnitude, f64x2.splat(3)));
}

function ${shape.name}Area(p: i32, ${rules}, out: i32): void {
  let s: v128 = f64x2.splat(0);
${nodeLoops(vector, shape, area, false, ': i32')}
  v128.store(out, s);
}

export function run${capital(shape.name)}(
  pairs: i32, input: i32, output: i32, count: i32, along: i32, nodes: i32, coarseCount: i32, coarseAlong: i32, coarseNodes: i32, table: i32, scratch: i32,
): void {
  for (let k: i32 = 0; k < pairs; k++) {
${powersOf(shape)}
    for (let i: i32 = 0; i < ${16 * AXES.length}; i += 16) v128.store(scratch + i, f64x2.sub(v128.load(scratch + i), v128.load(input + ${16 * shape.values} + i)));
    ${shape.name}Moments(scratch, count, along, along + ((${shape.alongCount}) << 3), nodes, nodes + (count << 3), output);
    if (coarseCount > 0) ${shape.name}Area(scratch, coarseCount, coarseAlong, coarseAlong + ((${shape.alongCount.replace('count', 'coarseCount')}) << 3), coarseNodes, coarseNodes + (coarseCount << 3), output + 336);
    input += ${16 * (shape.values + 3)};
    output += 352;
  }
}
`;
}

async function compile(source) {
  let bytes = null;
  const { error, stderr } = await asc.main(
    ['kernel.ts', '--outFile', 'kernel.wasm', '-O3', '--noAssert', '--runtime', 'stub', '--enable', 'simd', '--initialMemory', '24', '--maximumMemory', '24'],
    { readFile: (name) => (name === 'kernel.ts' ? source : null), writeFile: (name, contents) => void (name === 'kernel.wasm' && (bytes = contents)), listFiles: () => [] },
  );
  if (error !== null || bytes === null) throw new Error(`the kernel does not compile: ${error?.message ?? ''} ${stderr.toString()}`);
  return bytes;
}

function bytesSource(bytes) {
  const lines = Buffer.from(bytes).toString('base64').match(/.{1,120}/g);
  return `// Written by lib/run/build-kernel.mjs: the vector kernels as WebAssembly, kept in the source so that server, threads and browser have them without a request.

/** Base64 of the module. */
export const KERNEL_BYTES = [
${lines.map((text) => `  '${text}',`).join('\n')}
].join('');
`;
}

const files = Object.fromEntries([
  ...SHAPES.map((shape) => [`${shape.name}-scalar.ts`, scalarSource(shape)]),
  ['kernel-bytes.ts', bytesSource(await compile(SHAPES.map(vectorSource).join('') + FAN_ROUTINES))],
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
