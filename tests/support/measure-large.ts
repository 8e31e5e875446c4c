import { createReadStream } from 'node:fs';
import { measureCage } from '@/lib/engine/measure';
import { readMesh } from '@/lib/formats/read-mesh';

/** What a process that measured one file says of it: peaks of its memory in bytes, milliseconds. */
export interface LargeMeasured {
  faces: number;
  vertices: number;
  lastFace: number[];
  lastVertex: number[];
  volume: number;
  problems: string[];
  /** Held before the file was opened, at the peak of reading, and at the peak of all. */
  startBytes: number;
  readBytes: number;
  peakBytes: number;
  readMs: number;
  measureMs: number;
}

/** A process of its own, since only that has a peak of its own: the path of an OBJ file on the command line, the answer as JSON on stdout. */
const path = process.argv[2];
const peak = (): number => 1024 * process.resourceUsage().maxRSS;
const startBytes = peak();
const start = performance.now();
const cage = await readMesh(path, createReadStream(path, { highWaterMark: 2 ** 20 }));
const readMs = performance.now() - start;
const readBytes = peak();
const measured = measureCage(cage, { scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'whole' });
const answer: LargeMeasured = {
  faces: measured.faces,
  vertices: measured.vertices,
  lastFace: Array.from(cage.faceVertices.subarray(cage.faceStarts.at(-2))),
  lastVertex: Array.from(cage.positions.subarray(-3)),
  volume: measured.parts.flatMap((part) => part.components).reduce((sum, component) => sum + component.solid.volume, 0),
  problems: measured.findings.map((finding) => finding.code),
  startBytes,
  readBytes,
  peakBytes: peak(),
  readMs,
  measureMs: performance.now() - start - readMs,
};
process.stdout.write(JSON.stringify(answer));
