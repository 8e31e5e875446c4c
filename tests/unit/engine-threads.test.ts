import { afterEach, expect, test } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { setPatchTeam } from '@/lib/engine/kernel/patch-block';
import { dismissTeam, teamKernels, teamMemory } from '@/lib/engine/kernel/patch-team';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredCage } from '@/lib/engine/measured';
import { withPatchHelpers } from '@/lib/jobs/with-patch-helpers';
import { startHelper } from '../support/patch-helper';
import { cageOf } from '../support/put-cage';

afterEach(() => setPatchTeam(null));

/** A bent tube of n × m quads closed in itself: more patches than one round of a team holds. */
function tube(n: number, m: number): Cage {
  const positions: [number, number, number][] = [];
  const faces: number[][] = [];
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < m; j++) {
      const [a, b] = [(2 * Math.PI * i) / n, (2 * Math.PI * j) / m];
      const reach = 2 + (0.6 + 0.2 * Math.sin(3 * a)) * Math.cos(b);
      positions.push([reach * Math.cos(a), reach * Math.sin(a), 0.7 * Math.sin(b) + 0.1 * Math.cos(5 * a)]);
      const at = (x: number, y: number): number => (x % n) * m + (y % m);
      faces.push([at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)]);
    }
  }
  return cageOf([{ name: 'tube', positions, faces }]);
}

function measure(cage: Cage): MeasuredCage {
  return measureCage(cage, { scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group' });
}

test('one, two and three threads give the same bits as none beside', async () => {
  const cage = tube(180, 110);
  const alone = measure(cage);
  for (const helpers of [0, 1, 2]) {
    const memory = teamMemory();
    const workers = await Promise.all(Array.from({ length: helpers }, () => startHelper(memory)));
    setPatchTeam(teamKernels(memory));
    for (let round = 0; round < 3; round++) expect(measure(cage)).toEqual(alone);
    setPatchTeam(null);
    dismissTeam(memory);
    await Promise.all(workers.map((worker) => worker.terminate()));
  }
}, 120_000);

test('a measuring thread gives the same bits with threads that join while it works and with none', () => {
  const cage = tube(180, 110);
  const alone = measure(cage);
  expect(withPatchHelpers(0, () => measure(cage))).toEqual(alone);
  expect(withPatchHelpers(2, () => [1, 2, 3, 4].map(() => measure(cage)))).toEqual([alone, alone, alone, alone]);
}, 120_000);
