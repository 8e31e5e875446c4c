import type { QueuePage, QueueRow } from '@/lib/rules/approval-queue';

/** A value of 2 kg that waits for its first approval, with what a test wants different. */
export function makeQueueRow(different: Partial<QueueRow>): QueueRow {
  return {
    part_id: '00000000-0000-4000-8000-000000000001',
    asset: 'ox',
    category: 'creature',
    version: 'v012',
    row: 'part',
    part: 'torso',
    shot: null,
    reason: null,
    state: 'measured',
    value_sha256: 'a'.repeat(64),
    value_id: null,
    mass_kg: 2,
    com_x_m: 0.5,
    com_y_m: 0.5,
    com_z_m: 1,
    ixx_kg_m2: 5 / 6,
    iyy_kg_m2: 5 / 6,
    izz_kg_m2: 1 / 3,
    bounds_m: [0, 0, 0, 1, 1, 2],
    mass_source: 'target_mass',
    construction: 'solid',
    material: null,
    target_mass_kg: 2,
    density_kg_m3: 1,
    areal_density_kg_m2: null,
    set_by: 'Mara Quill',
    set_from: 'hand',
    set_at: '2026-11-28T10:12:00.000Z',
    setters: ['Mara Quill'],
    own: false,
    request: null,
    last: null,
    verdict: 'first approval',
    beyond_tolerance: null,
    differences: null,
    locked_shots: [],
    warnings: [],
    ...different,
  };
}

/** One page with all of these values. */
export function makeQueuePage(rows: readonly QueueRow[]): QueuePage {
  const waiting = rows.filter((row) => row.value_id === null);
  return {
    items: [...rows],
    counts: { waiting: waiting.length, asked: waiting.filter((row) => row.request !== null).length, outdated: rows.filter((row) => row.state === 'outdated').length, approved: rows.length - waiting.length },
    next_cursor: null,
  };
}
