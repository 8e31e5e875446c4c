import type { AssetTotal, PartPage, PartRow } from '@/lib/rules/part-row';

/** A measured cuboid of 1 × 1 × 2 m and 2 kg, with what a test wants different. */
export function makePartRow(different: Partial<PartRow>): PartRow {
  return {
    schema: '1',
    show: 'tarn',
    sequence: null,
    shot: null,
    copy: null,
    asset: 'ox',
    outside_id: null,
    category: 'creature',
    version: 'v001',
    row: 'part',
    part: 'torso',
    body: null,
    joint: null,
    variant: null,
    scale: 1,
    construction: 'solid',
    material: null,
    density_kg_m3: 1,
    areal_density_kg_m2: null,
    wall_m: null,
    target_mass_kg: null,
    area_m2: 10,
    volume_m3: 2,
    mass_kg: 2,
    com_x_m: 0.5,
    com_y_m: 0.5,
    com_z_m: 1,
    ixx_kg_m2: 5 / 6,
    iyy_kg_m2: 5 / 6,
    izz_kg_m2: 1 / 3,
    ixy_kg_m2: 0,
    ixz_kg_m2: 0,
    iyz_kg_m2: 0,
    i1_kg_m2: 1 / 3,
    i2_kg_m2: 5 / 6,
    i3_kg_m2: 5 / 6,
    axes_quat_w: 0.5,
    axes_quat_x: 0.5,
    axes_quat_y: 0.5,
    axes_quat_z: 0.5,
    free_axes: '23',
    space: 'ox',
    up_axis: 'y',
    numeric_error: 1e-16,
    adjusted: null,
    warnings: null,
    state: 'measured',
    reason: null,
    locked_at: null,
    part_id: null,
    value_id: null,
    value_sha256: null,
    problems: [],
    revision: 1,
    mass_source: 'density',
    set_by: 'Mara Quill',
    set_from: 'hand',
    set_at: '2026-11-28T10:12:00.000Z',
    bounds_m: [0, 0, 0, 1, 1, 2],
    cage_volume_m3: 2.2,
    faces: 6,
    max_valence: 3,
    locked_in: 0,
    outdated_in: 0,
    ...different,
  };
}

/** The totals that a server would give, but for the sums: those are the first part's. */
function totalOf(rows: readonly PartRow[]): AssetTotal {
  const [first] = rows;
  return {
    asset: first.asset,
    category: first.category,
    version: first.version,
    parts: rows.length,
    without_mass: rows.filter((row) => row.state === 'unset').length,
    blocked: rows.filter((row) => row.state === 'blocked').length,
    mass_kg: first.mass_kg,
    volume_m3: first.volume_m3,
    com_x_m: first.com_x_m,
    com_y_m: first.com_y_m,
    com_z_m: first.com_z_m,
    ixx_kg_m2: first.ixx_kg_m2,
    iyy_kg_m2: first.iyy_kg_m2,
    izz_kg_m2: first.izz_kg_m2,
    ixy_kg_m2: first.ixy_kg_m2,
    ixz_kg_m2: first.ixz_kg_m2,
    iyz_kg_m2: first.iyz_kg_m2,
    i1_kg_m2: first.i1_kg_m2,
    i2_kg_m2: first.i2_kg_m2,
    i3_kg_m2: first.i3_kg_m2,
    bounds_m: first.bounds_m,
    state: first.state,
  };
}

/** One page with all of these rows. */
export function makePartPage(rows: readonly PartRow[]): PartPage {
  const assets = [...new Set(rows.map((row) => row.asset))];
  const count = <K extends 'state' | 'category'>(key: K) =>
    Object.fromEntries(rows.map((row) => [row[key], rows.filter((other) => other[key] === row[key]).length]));
  return {
    items: [...rows],
    assets: assets.map((asset) => totalOf(rows.filter((row) => row.asset === asset))),
    counts: {
      total: rows.length,
      assets: assets.length,
      by_state: count('state'),
      by_category: count('category'),
      mass_kg: 0,
    },
    revision: 1,
    next_cursor: null,
  };
}
