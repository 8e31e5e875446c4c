import { parseArgs } from 'node:util';
import { BOUNDARIES, CREASING_RULES, PARTITIONS, SCHEMES, TRIANGLE_RULES, type Boundary, type Scheme, type TriangleRule } from '../engine/cage';
import type { MeasureOptions } from '../engine/measured';
import { MESH_EXTENSIONS } from '../formats/mesh-extensions';
import { LINEAR_UNITS, METRES_PER } from '../rules/units';

export const USAGE = `Usage: npm run --silent measure -- [options] FILE…

Prints volume, centre of mass and inertia of the limit surface of each mesh file, one line a part.
Files: ${MESH_EXTENSIONS.map((extension) => `.${extension}`).join(' ')}. An OBJ takes skin weights from NAME.weights.csv beside it.

  --scheme ${SCHEMES.join('|')}   (what the file asks for, else ${SCHEMES[0]})
  --boundary ${BOUNDARIES.join('|')}   what the file asks for, else ${BOUNDARIES[0]}
  --triangles ${TRIANGLE_RULES.join('|')}   (what the file asks for, else ${TRIANGLE_RULES[0]})
  --creasing ${CREASING_RULES.join('|')}   (${CREASING_RULES[0]})
  --parts-by whole|group|object|material|piece|joint   (whole)
  --unit ${LINEAR_UNITS.join('|')}   what one unit of the file is (what the file says, else m)
  --density KG_PER_M3   of every part (1000)
  --format json|csv   (json)

volume, first and second are in the file's own unit, about its origin, at unit density.
Exit code: 0 every file was measured, 1 one was not, 2 wrong usage.
`;

const FORMATS = ['json', 'csv'] as const;

export interface MeasureArguments {
  files: string[];
  /** Scheme, boundary and triangle rule are null where the command line leaves them to the file. */
  options: Omit<MeasureOptions, 'scheme' | 'boundary' | 'triangles'> & { scheme: Scheme | null; boundary: Boundary | null; triangles: TriangleRule | null };
  /** Null where the command line leaves it to the file. */
  metresPerUnit: number | null;
  densityKgPerM3: number;
  format: (typeof FORMATS)[number];
}

/** A command line that asks for something impossible; the message says what. */
export class UsageError extends Error {}

function choice<T extends string>(option: string, value: string | undefined, allowed: readonly T[], fallback: T): T {
  if (value === undefined) return fallback;
  const found = allowed.find((item) => item === value);
  if (found === undefined) throw new UsageError(`--${option} takes ${allowed.join(', ')}, not "${value}".`);
  return found;
}

/** Reads the command line; null asks for the usage text. Errors: UsageError. */
export function parseMeasureArguments(argv: string[]): MeasureArguments | null {
  const { values, positionals } = parse(argv);
  if (values.help) return null;
  if (positionals.length === 0) throw new UsageError('Name at least one file.');
  const density = values.density === undefined ? 1000 : Number(values.density);
  if (!(density > 0) || density === Infinity || values.density?.trim() === '') throw new UsageError(`--density takes a positive number, not "${values.density}".`);
  return {
    files: positionals,
    options: {
      scheme: values.scheme === undefined ? null : choice('scheme', values.scheme, SCHEMES, 'catmull-clark'),
      boundary: values.boundary === undefined ? null : choice('boundary', values.boundary, BOUNDARIES, 'edge-and-corner'),
      triangles: values.triangles === undefined ? null : choice('triangles', values.triangles, TRIANGLE_RULES, 'catmark'),
      creasing: choice('creasing', values.creasing, CREASING_RULES, 'uniform'),
      partsBy: choice('parts-by', values['parts-by'], PARTITIONS, 'whole'),
    },
    metresPerUnit: values.unit === undefined ? null : METRES_PER[choice('unit', values.unit, LINEAR_UNITS, 'm')],
    densityKgPerM3: density,
    format: choice('format', values.format, FORMATS, 'json'),
  };
}

function parse(argv: string[]) {
  const text = { type: 'string' } as const;
  try {
    return parseArgs({
      args: argv,
      allowPositionals: true,
      options: {
        scheme: text,
        boundary: text,
        triangles: text,
        creasing: text,
        'parts-by': text,
        unit: text,
        density: text,
        format: text,
        help: { type: 'boolean', short: 'h' },
      },
    });
  } catch (error) {
    if (error instanceof TypeError) throw new UsageError(error.message);
    throw error;
  }
}
