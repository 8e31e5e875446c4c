// The two languages that lib/run/build-kernel.mjs writes the kernels in, from one list of operations.

const CALLS = new Set(['abs', 'sqrt', 'inverse', 'larger']);

/** Reads an expression of + - * / ( ) abs( ) sqrt( ) inverse( ) larger( , ), names, numbers and p[…] into a tree. */
function parse(text) {
  const tokens = text.match(/[A-Za-z_]\w*(\[[^\]]*\])?|\d+(\.\d+)?(e-?\d+)?|[-+*/(),]/g);
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
    if (tokens[at] === '(' && CALLS.has(token)) {
      const inner = [];
      for (; tokens[at] !== ')'; inner.push(sum())) at++;
      at++;
      return { call: token, inner };
    }
    return { leaf: token };
  };
  const sum = level('+-', level('*/', factor));
  return sum();
}

/** Plain JavaScript, one patch at a time. */
export const scalar = {
  leaf: (text) => text,
  binary: (left, operator, right) => (operator === '/' && /^\d+$/.test(right) ? `(${left} * (1 / ${right}))` : `(${left} ${operator} ${right})`),
  call: (name, inner) => (name === 'inverse' || name === 'larger' ? `${name}(${inner})` : `Math.${name}(${inner})`),
  larger: (left, right) => `Math.max(${left}, ${right})`,
  declare: (name, value) => `const ${name} = ${value};`,
  start: (name) => `let ${name} = 0;`,
  store: (target, value) => `${target} = ${value};`,
};

const PER_PATCH = new Set(['p', 'net', 'bends', 'bounds']);
const NAMES = { '+': 'add', '-': 'sub', '*': 'mul', '/': 'div' };
/** AssemblyScript, a patch in either lane; arrays of vectors are PER_PATCH, all others hold a number for both lanes. */
export const vector = {
  leaf(text) {
    if (/^\d/.test(text)) return `f64x2.splat(${text})`;
    const [, array, index] = text.match(/^(\w+)\[(.*)\]$/) ?? [];
    if (array === undefined) return text;
    return PER_PATCH.has(array) ? `v128.load(${array} + ((${index}) << 4))` : `v128.load64_splat(${array} + ((${index}) << 3))`;
  },
  binary(left, operator, right) {
    // A multiplication by the reciprocal is faster.
    const divisor = operator === '/' ? right.match(/^f64x2\.splat\((\d+)\)$/) : null;
    return divisor === null ? `f64x2.${NAMES[operator]}(${left}, ${right})` : `f64x2.mul(${left}, f64x2.splat(${1 / Number(divisor[1])}))`;
  },
  call: (name, inner) => (name === 'inverse' || name === 'larger' ? `${name}(${inner})` : `f64x2.${name}(${inner})`),
  larger: (left, right) => `f64x2.max(${left}, ${right})`,
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
    if (tree.call !== undefined) return dialect.call(tree.call, tree.inner.map(write).join(', '));
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

/** `let name = expression`, `name := expression` for a store, `name += expression`, `name max= expression`. */
export function statements(dialect, lines) {
  return lines.map((line) => {
    const declared = line.match(/^let (\w+) = (.*)$/);
    if (declared) return dialect.declare(declared[1], print(dialect, declared[2]));
    const [, target, operator, value] = line.match(/^(.+?) (:=|\+=|max=) (.*)$/);
    if (operator === 'max=') return dialect.store(target, dialect.larger(target, print(dialect, value)));
    return dialect.store(target, print(dialect, operator === '+=' ? `${target} + ${value}` : value));
  });
}

/** Without the declarations that nothing after them reads. */
export function pruned(list) {
  const kept = [];
  const read = new Set();
  for (const text of list.toReversed()) {
    const name = text.match(/^let (\w+) = /)?.[1];
    if (name !== undefined && !read.has(name)) continue;
    kept.unshift(text);
    for (const word of text.replace(/^let \w+ = /, '').match(/[A-Za-z_]\w*/g) ?? []) read.add(word);
  }
  return kept;
}
