import { once } from 'node:events';
import { createReadStream } from 'node:fs';
import { readFile } from 'node:fs/promises';
import path from 'node:path';
import type { MeasuredCage } from '../engine/measured';
import { measureCage } from '../engine/measure';
import { MeshError } from '../formats/mesh-error';
import type { Beside } from '../formats/beside';
import { readMesh } from '../formats/read-mesh';
import { parseMeasureArguments, UsageError, USAGE, type MeasureArguments } from './measure-arguments';
import { csvHeader, csvLine, measureRecord } from './measure-record';

const NOT_MEASURED = 1;
const WRONG_USAGE = 2;
const CHUNK_BYTES = 1 << 20;

/** Why a file cannot be opened, in words; other causes are shown as the system says them. */
const FILE_ERRORS = new Map([
  ['ENOENT', 'there is no such file'],
  ['EISDIR', 'this is a folder, not a file'],
  ['EACCES', 'this file may not be read'],
]);

/**
 * The command `measure`: reads the arguments, measures each file in turn and prints a line per part.
 * `resolve` turns a name of the command line into a path. Resolves to the exit code.
 */
export async function measureFiles(argv: string[], resolve: (file: string) => string): Promise<number> {
  stopQuietlyWhenTheReaderLeaves();
  let given: MeasureArguments | null;
  try {
    given = parseMeasureArguments(argv);
  } catch (error) {
    if (!(error instanceof UsageError)) throw error;
    process.stderr.write(`${error.message}\n\n${USAGE}`);
    return WRONG_USAGE;
  }
  if (given === null) {
    await print(USAGE);
    return 0;
  }
  if (given.format === 'csv') await print(csvHeader());
  let code = 0;
  for (const file of given.files) if (!(await measureFile(file, resolve(file), given))) code = NOT_MEASURED;
  return code;
}

/** Prints a file's parts; false where the file or one of its parts has no numbers, which is then said on stderr. */
async function measureFile(file: string, where: string, given: MeasureArguments): Promise<boolean> {
  let measured: MeasuredCage;
  let metresPerUnit = 1;
  try {
    const cage = await readMesh(file, createReadStream(where, { highWaterMark: CHUNK_BYTES }), besideOf(where));
    metresPerUnit = given.metresPerUnit ?? cage.metresPerUnit ?? 1;
    for (const warning of cage.warnings) complain(file, warning.line, warning.column, `warning: ${warning.message}`);
    measured = measureCage(cage, { ...given.options, scheme: given.options.scheme ?? cage.scheme ?? 'catmull-clark', triangles: given.options.triangles ?? cage.triangles ?? 'catmark', boundary: given.options.boundary ?? cage.boundary ?? 'edge-and-corner' });
  } catch (error) {
    if (error instanceof MeshError) {
      complain(file, error.line, error.column, error.detail);
      if (error.excerpt !== null) process.stderr.write(`${error.excerpt}\n`);
    } else if (isSystemError(error)) complain(file, null, null, FILE_ERRORS.get(error.code) ?? error.message);
    else throw error;
    return false;
  }
  let complete = true;
  for (const part of measured.parts) {
    const record = measureRecord({ file, part, findings: measured.findings, metresPerUnit, densityKgPerM3: given.densityKgPerM3 });
    await print(given.format === 'csv' ? csvLine(record) : `${JSON.stringify(record)}\n`);
    if (record.volume !== null) continue;
    complete = false;
    const blocking = record.problems.filter((finding) => finding.severity === 'problem');
    for (const finding of blocking) complain(file, finding.places[0]?.line ?? null, null, `part ${part.name}: ${finding.message}`);
  }
  return complete;
}

/** Finds what lies in a file's own folder or below it: a glTF's buffers, an OBJ's weights. */
function besideOf(file: string): Beside {
  const folder = path.dirname(file);
  return async (wanted) => {
    const found = path.resolve(folder, wanted);
    if (path.relative(folder, found).startsWith('..')) return null;
    try {
      return await readFile(found);
    } catch (error) {
      if (isSystemError(error)) return null;
      throw error;
    }
  };
}

/** One line on stderr, `file:line:column: message`, as editors and build tools understand it; 1:1 stands for the whole file. */
function complain(file: string, line: number | null, column: number | null, message: string): void {
  process.stderr.write(`${file}:${line ?? 1}:${column ?? 1}: ${message}\n`);
}

async function print(text: string): Promise<void> {
  if (!process.stdout.write(text)) await once(process.stdout, 'drain');
}

/** `measure … | head` closes our output early: that is the reader's right and no failure. */
function stopQuietlyWhenTheReaderLeaves(): void {
  for (const stream of [process.stdout, process.stderr]) {
    stream.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code !== 'EPIPE') throw error;
      process.exit();
    });
  }
}

function isSystemError(error: unknown): error is NodeJS.ErrnoException & { code: string } {
  return error instanceof Error && 'syscall' in error && 'code' in error && typeof error.code === 'string';
}
