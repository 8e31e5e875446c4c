import { sql } from 'drizzle-orm';
import { check, doublePrecision, text, type AnyPgColumn } from 'drizzle-orm/pg-core';
import { CATEGORIES, CONSTRUCTIONS, MASS_SOURCES, ROW_KINDS } from '../../lib/rules/states';
import { finite, finiteNotNegative, finitePositive, oneOf } from './checks';

/**
 * The columns of a value under the names of the CSV (SI, the asset's axes, inertia about the centre of mass as matrix entries):
 * the current one of a part, an approved one, that of a shot override.
 */
export function valueColumns() {
  return {
    asset: text('asset').notNull(),
    outsideId: text('outside_id'),
    category: text('category', { enum: CATEGORIES }).notNull(),
    version: text('version').notNull(),
    row: text('row', { enum: ROW_KINDS }).notNull().default('part'),
    part: text('part').notNull(),
    body: text('body'),
    joint: text('joint'),
    variant: text('variant'),
    scale: doublePrecision('scale').notNull(),
    construction: text('construction', { enum: CONSTRUCTIONS }).notNull(),
    material: text('material'),
    densityKgPerM3: doublePrecision('density_kg_m3'),
    arealDensityKgPerM2: doublePrecision('areal_density_kg_m2'),
    wallM: doublePrecision('wall_m'),
    targetMassKg: doublePrecision('target_mass_kg'),
    areaM2: doublePrecision('area_m2'),
    volumeM3: doublePrecision('volume_m3'),
    massKg: doublePrecision('mass_kg'),
    comXM: doublePrecision('com_x_m'),
    comYM: doublePrecision('com_y_m'),
    comZM: doublePrecision('com_z_m'),
    ixxKgM2: doublePrecision('ixx_kg_m2'),
    iyyKgM2: doublePrecision('iyy_kg_m2'),
    izzKgM2: doublePrecision('izz_kg_m2'),
    ixyKgM2: doublePrecision('ixy_kg_m2'),
    ixzKgM2: doublePrecision('ixz_kg_m2'),
    iyzKgM2: doublePrecision('iyz_kg_m2'),
    i1KgM2: doublePrecision('i1_kg_m2'),
    i2KgM2: doublePrecision('i2_kg_m2'),
    i3KgM2: doublePrecision('i3_kg_m2'),
    axesQuatW: doublePrecision('axes_quat_w'),
    axesQuatX: doublePrecision('axes_quat_x'),
    axesQuatY: doublePrecision('axes_quat_y'),
    axesQuatZ: doublePrecision('axes_quat_z'),
    freeAxes: text('free_axes', { enum: ['', '12', '23', '123'] }).notNull().default(''),
    space: text('space').notNull(),
    upAxis: text('up_axis', { enum: ['y', 'z'] }).notNull(),
    numericError: doublePrecision('numeric_error'),
    adjusted: text('adjusted'),
    /** Codes of warnings, joined by spaces. */
    warnings: text('warnings').notNull().default(''),
    /** Box in the asset's axes, metres: min xyz, max xyz. */
    boundsM: doublePrecision('bounds_m').array(),
    cageVolumeM3: doublePrecision('cage_volume_m3'),
    massSource: text('mass_source', { enum: MASS_SOURCES }),
    valueSha256: text('value_sha256'),
  };
}

/** What a value's columns must hold, under names that begin with the table's. */
export function valueChecks(table: string, t: Record<keyof ReturnType<typeof valueColumns>, AnyPgColumn>) {
  return [
    check(`${table}_row`, oneOf(t.row, ROW_KINDS)),
    check(`${table}_construction`, oneOf(t.construction, CONSTRUCTIONS)),
    check(`${table}_free_axes`, oneOf(t.freeAxes, ['', '12', '23', '123'])),
    check(`${table}_mass`, finitePositive(t.massKg)),
    check(`${table}_density`, finitePositive(t.densityKgPerM3)),
    check(`${table}_areal_density`, finitePositive(t.arealDensityKgPerM2)),
    check(`${table}_wall`, finitePositive(t.wallM)),
    check(`${table}_target`, finitePositive(t.targetMassKg)),
    check(`${table}_area`, finiteNotNegative(t.areaM2)),
    check(`${table}_volume`, finitePositive(t.volumeM3)),
    check(`${table}_scale`, finitePositive(t.scale)),
    check(`${table}_cage_volume`, finite(t.cageVolumeM3)),
    check(
      `${table}_bounds`,
      sql`cardinality(${t.boundsM}) = 6 and not ('NaN'::float8 = any (${t.boundsM}) or 'Infinity'::float8 = any (${t.boundsM}) or '-Infinity'::float8 = any (${t.boundsM}))`,
    ),
    check(`${table}_error`, finiteNotNegative(t.numericError)),
    check(
      `${table}_com_finite`,
      sql`abs(${t.comXM}) < 'Infinity' and abs(${t.comYM}) < 'Infinity' and abs(${t.comZM}) < 'Infinity'`,
    ),
    check(
      `${table}_inertia_finite`,
      sql`abs(${t.ixxKgM2}) < 'Infinity' and abs(${t.iyyKgM2}) < 'Infinity' and abs(${t.izzKgM2}) < 'Infinity' and abs(${t.ixyKgM2}) < 'Infinity' and abs(${t.ixzKgM2}) < 'Infinity' and abs(${t.iyzKgM2}) < 'Infinity'`,
    ),
    check(
      `${table}_moments`,
      sql`${t.i1KgM2} >= 0 and ${t.i1KgM2} <= ${t.i2KgM2} and ${t.i2KgM2} <= ${t.i3KgM2} and ${t.i3KgM2} > 0 and ${t.i3KgM2} < 'Infinity' and ${t.i1KgM2} + ${t.i2KgM2} >= ${t.i3KgM2} - 1e-13 * ${t.i3KgM2}`,
    ),
    check(
      `${table}_quaternion`,
      sql`${t.axesQuatW} >= 0 and abs(${t.axesQuatW} * ${t.axesQuatW} + ${t.axesQuatX} * ${t.axesQuatX} + ${t.axesQuatY} * ${t.axesQuatY} + ${t.axesQuatZ} * ${t.axesQuatZ} - 1) < 1e-12`,
    ),
    check(
      `${table}_all_or_none`,
      sql`num_nulls(${t.massKg}, ${t.comXM}, ${t.comYM}, ${t.comZM}, ${t.ixxKgM2}, ${t.iyyKgM2}, ${t.izzKgM2}, ${t.ixyKgM2}, ${t.ixzKgM2}, ${t.iyzKgM2}, ${t.i1KgM2}, ${t.i2KgM2}, ${t.i3KgM2}, ${t.axesQuatW}, ${t.axesQuatX}, ${t.axesQuatY}, ${t.axesQuatZ}, ${t.valueSha256}) in (0, 18)`,
    ),
  ];
}
