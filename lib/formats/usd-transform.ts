import { fromTranslationRotationScale, IDENTITY, multiply, type Matrix } from './matrix';
import { MeshError } from './mesh-error';
import { numbersOf, textsOf, type UsdPrim } from './usd-prim';

const INVERT = '!invert!';
const RESET = '!resetXformStack!';
const ROTATION = /^rotate([XYZ]{1,3})$/;
const MOST_OPERATIONS = 64;

export interface UsdTransform {
  local: Matrix;
  /** The prim does not follow its parent. */
  resets: boolean;
  animated: boolean;
}

/**
 * A prim's own transform, from the operations that `xformOpOrder` lists: the last of them acts on a point first. Angles are in degrees; `rotateXYZ` turns about x,
 * then y, then z. Source: the standard's UsdGeomXformable (from memory). Errors: bad_transform with the prim's path.
 */
export function primTransform(prim: UsdPrim, path: string): UsdTransform {
  const order = textsOf(prim, 'xformOpOrder');
  if (order.length > MOST_OPERATIONS) throw bad(path, `at most ${MOST_OPERATIONS} operations in xformOpOrder`);
  let local: Matrix = IDENTITY;
  let animated = false;
  const resets = order.includes(RESET);
  for (const entry of order.slice(order.lastIndexOf(RESET) + 1)) {
    const inverted = entry.startsWith(INVERT);
    const name = inverted ? entry.slice(INVERT.length) : entry;
    animated ||= prim.attributes.get(name)?.animated === true;
    const matrix = operation(name.split(':')[1] ?? '', numbersOf(prim, name), `${path}.${name}`);
    local = multiply(inverted ? inverse(matrix, `${path}.${name}`) : matrix, local);
  }
  return { local, resets, animated };
}

function bad(path: string, expected: string): MeshError {
  return new MeshError({ code: 'bad_transform', expected, detail: `prim ${path.slice(0, 200)}: expected ${expected}` });
}

function operation(kind: string, given: ArrayLike<number> | null, path: string): Matrix {
  const need = (count: number): ArrayLike<number> => {
    if (given === null || given.length !== count) throw bad(path, `${count} number${count === 1 ? '' : 's'}, found ${given?.length ?? 'none'}`);
    return given;
  };
  if (kind === 'transform') return need(16);
  if (kind === 'orient') {
    const [w, x, y, z] = Array.from(need(4));
    return fromTranslationRotationScale([0, 0, 0], [x, y, z, w], [1, 1, 1]);
  }
  if (kind === 'translate') return fromTranslationRotationScale(need(3), [0, 0, 0, 1], [1, 1, 1]);
  if (kind === 'scale') return fromTranslationRotationScale([0, 0, 0], [0, 0, 0, 1], need(3));
  const axes = ROTATION.exec(kind)?.[1];
  if (!axes || axes.length === 2) throw bad(path, 'translate, scale, orient, transform or a rotation');
  const angles = need(axes.length);
  let turned: Matrix = IDENTITY;
  for (const axis of axes) turned = multiply(turned, rotation('XYZ'.indexOf(axis), axes.length === 1 ? angles[0] : angles['XYZ'.indexOf(axis)]));
  return turned;
}

/** A turn about one axis; multiples of a right angle are exact. */
function rotation(axis: number, degrees: number): Matrix {
  const quarter = degrees / 90;
  const [sine, cosine] = Number.isInteger(quarter)
    ? [[0, 1, 0, -1][((quarter % 4) + 4) % 4], [1, 0, -1, 0][((quarter % 4) + 4) % 4]]
    : [Math.sin((degrees * Math.PI) / 180), Math.cos((degrees * Math.PI) / 180)];
  const m = Float64Array.from(IDENTITY);
  const [a, b] = [(axis + 1) % 3, (axis + 2) % 3];
  m[5 * a] = cosine;
  m[4 * a + b] = sine;
  m[4 * b + a] = -sine;
  m[5 * b] = cosine;
  return m;
}

/** The inverse of an affine transform. Errors: bad_transform where there is none. */
function inverse(m: Matrix, path: string): Matrix {
  const [a, b, c, d, e, f, g, h, i] = [m[0], m[1], m[2], m[4], m[5], m[6], m[8], m[9], m[10]];
  const determinant = a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
  if (determinant === 0 || !Number.isFinite(determinant)) throw bad(path, 'an operation that can be inverted');
  const linear = [e * i - f * h, c * h - b * i, b * f - c * e, f * g - d * i, a * i - c * g, c * d - a * f, d * h - e * g, b * g - a * h, a * e - b * d].map((value) => value / determinant);
  const [x, y, z] = [m[12], m[13], m[14]];
  return [
    linear[0], linear[1], linear[2], 0,
    linear[3], linear[4], linear[5], 0,
    linear[6], linear[7], linear[8], 0,
    -(x * linear[0] + y * linear[3] + z * linear[6]), -(x * linear[1] + y * linear[4] + z * linear[7]), -(x * linear[2] + y * linear[5] + z * linear[8]), 1,
  ];
}
