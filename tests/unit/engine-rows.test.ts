import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { RegularPatches } from '@/lib/engine/kernel/regular-patches';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions } from '@/lib/engine/measured';
import { buildTopology } from '@/lib/engine/mesh/topology';
import { emptySums, type LimitSums } from '@/lib/engine/moments/limit-sums';
import { ROW_NODES, rowRule, rowRuleDefect, SHORT_ROW } from '@/lib/engine/moments/row-rule';
import { classifyVertices, TRIANGLE_COUNTS } from '@/lib/engine/schemes/classify-vertices';
import { levelZero, type LevelMesh } from '@/lib/engine/schemes/level-mesh';
import { RowPatches } from '@/lib/engine/schemes/loop-row';
import { splitTriangleStrip, triangleStripSide, type TriangleRow } from '@/lib/engine/schemes/loop-strip';
import { LOOP_SHELL } from '@/lib/engine/shell/shell-kits';
import { SHELL_TOLERANCE, ShellVisitor } from '@/lib/engine/shell/shell-visitor';
import { cageOf, cageSize, CATMULL_CLARK, facesOf, momentError, totalEstimate, totalMoments } from '../support/engine-cages';
import { gridBox } from '../support/grid-box';
import { refinedOnce } from '../support/random-cages';

const LOOP: MeasureOptions = { ...CATMULL_CLARK, scheme: 'loop' };

/** A triangulated box with moved points and a crease across its top, cut into two groups along the crease. */
function creasedBox(sharpness: number, amplitude: number, [m, n]: readonly [number, number] = [4, 3]): Cage {
  const wave = (x: number): number => amplitude * Math.sin(x);
  const box = gridBox([m, 4, n], (i, j, k) => [i + wave(5 * i * i + 3 * j + k), j + wave(5 * k + 4 * i * i), k + wave(7 * i + 2 * j)]);
  const faces = box.faces.flatMap(([a, b, c, d]) => [[a, b, c], [a, c, d]]);
  const creases = Array.from({ length: m }, (_, i): [number, number, number] => [box.vertexAt(i, 2, n), box.vertexAt(i + 1, 2, n), sharpness]);
  const rows = gridBox([m, 4, n], (_, j) => [j]).positions;
  const labels = Int32Array.from(faces, (face) => Number(face.every((v) => rows[v][0] <= 2)));
  return { ...cageOf(box.positions, faces, creases), groups: { names: ['near', 'far'], labels } };
}

/** The cage after so many refinements of all of it. */
function refined(cage: Cage, steps: number): Cage {
  if (steps === 0) return cage;
  const labels = facesOf(cage).flatMap((_, f) => new Array<number>(4).fill(cage.groups?.labels[f] ?? 0));
  return refined({ ...refinedOnce(cage, LOOP), groups: { names: cage.groups?.names ?? [], labels: Int32Array.from(labels) } }, steps - 1);
}

/** The strips of a cage: its mesh and their half-edges along the crease. */
function stripsOf(cage: Cage): { mesh: LevelMesh; sides: number[] } {
  const { mesh: topology } = buildTopology(cage);
  const mesh = levelZero(topology, Float64Array.from(cage.positions), new Int32Array(topology.faces), new Uint8Array(1), 'edge-only');
  const { kinds } = classifyVertices(mesh, TRIANGLE_COUNTS);
  const sides = Array.from({ length: mesh.faces }, (_, face) => triangleStripSide(mesh, kinds, face)).filter((h) => h >= 0);
  expect(sides.length).toBeGreaterThan(0);
  return { mesh, sides };
}

const ORIGIN = Float64Array.of(2, 2, 1.5);

/** What `add` makes of all long rows of a cage. */
function sumRows(cage: Cage, add: (row: TriangleRow, rows: RowPatches, patches: RegularPatches) => void): LimitSums {
  const sums = emptySums(1);
  const shells = new ShellVisitor(LOOP_SHELL, ORIGIN, 1);
  sums.shells = shells;
  const rows = new RowPatches(ORIGIN, sums);
  const patches = new RegularPatches('triangle', ORIGIN, sums);
  const { mesh, sides } = stripsOf(cage);
  let long = 0;
  const row = (one: TriangleRow): void => {
    if (one.count <= SHORT_ROW) return;
    long++;
    add(one, rows, patches);
  };
  for (const h of sides) splitTriangleStrip(mesh, h, 'uniform', { piece: () => undefined, side: () => undefined, row });
  expect(long).toBeGreaterThan(0);
  patches.flush();
  shells.close();
  return sums;
}

function addPieces(row: TriangleRow, _: RowPatches, patches: RegularPatches): void {
  const nets = new Float64Array(36 * row.pieces);
  for (let i = 0; i < row.count; i++) {
    row.fill(i, nets);
    for (let piece = 0; piece < row.pieces; piece++) patches.add(0, nets.subarray(36 * piece, 36 * (piece + 1)));
  }
}

const addRow = (row: TriangleRow, rows: RowPatches, patches: RegularPatches): void => rows.add(0, row, patches);

const undo: (() => void)[] = [];
afterEach(() => {
  while (undo.length > 0) undo.pop()?.();
});

function spoil(values: Float64Array, at: number, by: number): void {
  const before = values[at];
  values[at] += by;
  undo.push(() => (values[at] = before));
}

describe('rowRule', () => {
  it('sums powers up to 2n − 1 as whole numbers do, with positive weights', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 16 }), fc.integer({ min: 0, max: 1100 }), (n, more) => {
      const count = n + more;
      const { nodes, weights } = rowRule(n, count);
      expect(Math.min(...weights)).toBeGreaterThan(0);
      for (let k = 0; k < 2 * n; k++) {
        let exact = 0n, size = 0n;
        for (let i = 0; i < count; i++) {
          const power = BigInt(2 * i - count + 1) ** BigInt(k);
          exact += power;
          size += power < 0n ? -power : power;
        }
        if (size === 0n) continue;
        let sum = 0;
        for (let j = 0; j < n; j++) sum += weights[j] * ((2 * nodes[j] - count + 1) / count) ** k;
        const digits = 2n ** 200n;
        const over = (value: bigint): number => Number((value * digits) / BigInt(count) ** BigInt(k)) / 2 ** 200;
        expect(Math.abs(sum - over(exact)) / over(size)).toBeLessThan(2e-14);
      }
    }), { numRuns: 60 });
  });

  it('tells of a node or a weight gone wrong', () => {
    const rule = rowRule(9, 64);
    expect(rowRuleDefect(rule)).toBeLessThan(1e-14);
    spoil(rule.nodes, 2, 1e-9);
    expect(rowRuleDefect(rule)).toBeGreaterThan(1e-11);
    undo.pop()?.();
    spoil(rule.weights, 4, 1e-10);
    expect(rowRuleDefect(rule)).toBeGreaterThan(1e-12);
  });
});

describe('a row of triangles along a semi-sharp crease', () => {
  for (const sharpness of [6, 6.4, 7, 8.6]) {
    for (const amplitude of [0.2, 0.6]) {
      it(`is the sum of its pieces, walls and all: sharpness ${sharpness}, amplitude ${amplitude}`, () => {
        const cage = creasedBox(sharpness, amplitude);
        const [found, wanted] = [addRow, addPieces].map((add) => sumRows(cage, add));
        const size = cageSize(cage);
        expect(Math.abs(found.solid.magnitudes[0] / wanted.solid.magnitudes[0] - 1)).toBeLessThan(0.01);
        // Coordinates are rounded as those of the whole triangle are, of which the row is one part in its count.
        const magnitude = wanted.solid.magnitudes[0] * 2 ** Math.floor(sharpness);
        const [a, b] = [found, wanted].map((sums) => sums.solid.total(0));
        a.forEach((value, i) => expect(Math.abs(value - b[i]) / (magnitude * size ** (i === 0 ? 0 : i < 4 ? 1 : 2))).toBeLessThan(1e-15));
        const [areas, wantedAreas] = [found, wanted].map((sums) => sums.surface.total(0));
        const doubt = found.surfaceError[0] + wanted.surfaceError[0];
        expect(Math.abs(areas[0] - wantedAreas[0])).toBeLessThanOrEqual(doubt + 1e-14 * areas[0]);
        const [shell, wantedShell] = [found, wanted].map((sums) => sums.shells?.shells[0]);
        if (shell === undefined || wantedShell === undefined) throw new Error('no shells');
        // Either way each piece is good to SHELL_TOLERANCE of its bends, more or less: ∫ 2H dA, ∫ K dA, ∫ (N + 2H X) dA, ….
        const bend = Math.abs(wantedShell.terms[0]) + Math.sqrt(areas[0]);
        const scales = [bend, bend ** 2 / areas[0]];
        shell.terms.forEach((value, i) => expect(Math.abs(value - wantedShell.terms[i]) / (scales[i] ?? bend * size ** 2 + bend ** 2 / areas[0])).toBeLessThan(10 * SHELL_TOLERANCE));
        expect(Math.abs(shell.peak.curvature / wantedShell.peak.curvature - 1)).toBeLessThan(0.01);
      });
    }
  }

  it('has moments of degree 13: six nodes are too few, seven enough', () => {
    const cage = creasedBox(6.5, 2);
    const { mesh, sides } = stripsOf(cage);
    const worst = [6, 7].map((nodes) => {
      let off = 0;
      const row = (one: TriangleRow): void => {
        const nets = new Float64Array(36 * one.pieces);
        const sumAt = (places: ArrayLike<number>, weights: ArrayLike<number>): { moments: Float64Array; magnitude: number } => {
          const sums = emptySums(1);
          for (let k = 0; k < places.length; k++) {
            const each = emptySums(1);
            const patches = new RegularPatches('triangle', ORIGIN, each);
            one.fill(places[k], nets);
            for (let piece = 0; piece < one.pieces; piece++) patches.add(0, nets.subarray(36 * piece, 36 * (piece + 1)));
            patches.flush();
            sums.solid.add(0, each.solid.total(0).map((value) => weights[k] * value), 0);
            sums.solid.magnitudes[0] += weights[k] * each.solid.magnitudes[0];
          }
          return { moments: sums.solid.total(0), magnitude: sums.solid.magnitudes[0] };
        };
        const rule = rowRule(nodes, one.count);
        const found = sumAt(rule.nodes, rule.weights);
        const wanted = sumAt(Array.from({ length: one.count }, (_, i) => i), new Array<number>(one.count).fill(1));
        found.moments.forEach((value, i) => (off = Math.max(off, Math.abs(value - wanted.moments[i]) / (wanted.magnitude * cageSize(cage) ** (i === 0 ? 0 : i < 4 ? 1 : 2)))));
      };
      for (const h of sides) splitTriangleStrip(mesh, h, 'uniform', { piece: () => undefined, side: () => undefined, row });
      return off;
    });
    expect(worst[0]).toBeGreaterThan(1e-10);
    expect(worst[1]).toBeLessThan(1e-13);
  });

  it('is as when all is refined until the sharpness is gone, with a border of parts along it', () => {
    const cage = creasedBox(6, 0.3, [3, 1]);
    const smooth = refined(cage, 6);
    const options: MeasureOptions = { ...LOOP, partsBy: 'group' };
    const [found, wanted] = [measureCage(cage, options), measureCage(smooth, options)];
    expect(found.parts).toHaveLength(2);
    found.parts.forEach((part, i) => {
      expect(momentError(totalMoments([part]), totalMoments([wanted.parts[i]]), cageSize(cage))).toBeLessThan(1e-14);
      const [a, b] = [part.components[0], wanted.parts[i].components[0]];
      expect(Math.abs(a.surface.area / b.surface.area - 1)).toBeLessThanOrEqual(a.surfaceErrorEstimate + b.surfaceErrorEstimate);
    });
    const [whole] = [measureCage(cage, LOOP).parts];
    expect(momentError(totalMoments(found.parts), totalMoments(whole), cageSize(cage))).toBeLessThan(1e-14);
  });

  it.each([[ROW_NODES[0], 'whole'], [16, 'group']] as const)('stays within the stated error where a node or a weight of the rule with %i nodes is off, by %s', (nodes, partsBy) => {
    const cage = creasedBox(7, 0.5);
    const options: MeasureOptions = { ...LOOP, partsBy };
    const right = measureCage(cage, options).parts;
    const rule = rowRule(nodes, 2 ** 7);
    for (const [values, by] of [[rule.nodes, 1e-2], [rule.nodes, 1e-4], [rule.weights, 1e-2], [rule.weights, 1e-5]] as const) {
      spoil(values, 3, by);
      measureCage(cage, options).parts.forEach((part, i) => {
        const error = momentError(totalMoments([part]), totalMoments([right[i]]), cageSize(cage));
        expect(error).toBeGreaterThan(1e-13);
        expect(totalEstimate([part])).toBeGreaterThanOrEqual(error);
      });
      undo.pop()?.();
    }
  });
});
