import { sql } from 'drizzle-orm';
import { check, doublePrecision, integer, pgTable, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { finite, finiteNotNegative } from './checks';
import { geometryParts } from './geometry-parts';

/**
 * A connected component of a part, in the record's unit and axes, at unit density. Second moments are integrals of products
 * about the component's own centroid (matrix entries of ∫ x xᵀ). Volume is signed: a cavity counts negative.
 */
export const geometryComponents = pgTable(
  'geometry_components',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    partId: uuid('geometry_part_id')
      .notNull()
      .references(() => geometryParts.id, { onDelete: 'restrict' }),
    ordinal: integer('ordinal').notNull(),
    faces: integer('faces').notNull(),
    volume: doublePrecision('volume').notNull(),
    /** Centroid, x y z. */
    centroid: doublePrecision('centroid').array().notNull(),
    /** xx yy zz xy xz yz. */
    centralSecond: doublePrecision('central_second').array().notNull(),
    area: doublePrecision('area').notNull(),
    surfaceCentroid: doublePrecision('surface_centroid').array().notNull(),
    surfaceCentralSecond: doublePrecision('surface_central_second').array().notNull(),
    cageVolume: doublePrecision('cage_volume').notNull(),
    cageCentroid: doublePrecision('cage_centroid').array().notNull(),
    cageCentralSecond: doublePrecision('cage_central_second').array().notNull(),
    /** Coefficients of the hollow solid's ten moments in the wall thickness, t¹ to t⁵ each; null where not computed. */
    hollow: doublePrecision('hollow').array(),
    /** Largest inward curvature, where (x y z), and the coefficients in t, t², t³ of what the wall's moments may be off by; null with `hollow`. */
    hollowLimits: doublePrecision('hollow_limits').array(),
    errorEstimate: doublePrecision('error_estimate').notNull(),
    surfaceErrorEstimate: doublePrecision('surface_error_estimate').notNull(),
  },
  (t) => [
    uniqueIndex('geometry_components_part_ordinal_key').on(t.partId, t.ordinal),
    check('geometry_components_volume', sql`${finite(t.volume)} and ${finite(t.cageVolume)}`),
    check('geometry_components_area', finiteNotNegative(t.area)),
    check('geometry_components_error', sql`${finiteNotNegative(t.errorEstimate)} and ${finiteNotNegative(t.surfaceErrorEstimate)}`),
    check('geometry_components_shapes', sql`cardinality(${t.centroid}) = 3 and cardinality(${t.centralSecond}) = 6 and cardinality(${t.surfaceCentroid}) = 3 and cardinality(${t.surfaceCentralSecond}) = 6 and cardinality(${t.cageCentroid}) = 3 and cardinality(${t.cageCentralSecond}) = 6 and (${t.hollow} is null or cardinality(${t.hollow}) = 50) and (${t.hollowLimits} is null or cardinality(${t.hollowLimits}) = 7)`),
    check('geometry_components_finite', sql`not ('NaN'::float8 = any (${t.centroid} || ${t.centralSecond} || ${t.surfaceCentroid} || ${t.surfaceCentralSecond}) or 'Infinity'::float8 = any (${t.centroid} || ${t.centralSecond} || ${t.surfaceCentroid} || ${t.surfaceCentralSecond}) or '-Infinity'::float8 = any (${t.centroid} || ${t.centralSecond} || ${t.surfaceCentroid} || ${t.surfaceCentralSecond}))`),
  ],
);
