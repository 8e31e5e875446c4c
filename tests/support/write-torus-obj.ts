import { closeSync, openSync, writeSync } from 'node:fs';

/** Lines that are put together before they are written. */
const LINES = 20_000;

/** Quads between those that are cut, each way. */
const CUT_EVERY = 10;

/**
 * Writes an OBJ file of a torus (radii 3 and 1 of its vertices) of n × n quads with all digits, of which one in a hundred is cut in two where `cut`.
 * Answers how many faces it has. However large it is, little of it is held.
 */
export function writeTorusObj(path: string, n: number, cut: boolean): number {
  const file = openSync(path, 'w');
  let lines: string[] = [];
  let faces = 0;
  const put = (line: string): void => {
    if (lines.push(line) < LINES) return;
    writeSync(file, `${lines.join('\n')}\n`);
    lines = [];
  };
  const circle = Array.from({ length: n }, (_, i) => [Math.cos((2 * Math.PI * i) / n), Math.sin((2 * Math.PI * i) / n)]);
  for (const [cosA, sinA] of circle) for (const [cosB, sinB] of circle) put(`v ${(3 + cosB) * cosA} ${(3 + cosB) * sinA} ${sinB}`);
  for (let i = 0; i < n; i++) {
    const next = ((i + 1) % n) * n + 1;
    for (let j = 0; j < n; j++) {
      const right = (j + 1) % n;
      const [p, q, r, s] = [i * n + 1 + j, next + j, next + right, i * n + 1 + right];
      if (!cut || i % CUT_EVERY > 0 || j % CUT_EVERY > 0) put(`f ${p} ${q} ${r} ${s}`);
      else {
        put(`f ${p} ${q} ${r}`);
        put(`f ${p} ${r} ${s}`);
        faces++;
      }
      faces++;
    }
  }
  writeSync(file, `${lines.join('\n')}\n`);
  closeSync(file);
  return faces;
}
