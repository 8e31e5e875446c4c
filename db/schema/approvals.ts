import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, pgTable, text, timestamp, uniqueIndex, uuid, type AnyPgColumn } from 'drizzle-orm/pg-core';
import { assetVersions } from './asset-versions';
import { assets } from './assets';
import { geometryParts } from './geometry-parts';
import { parts } from './parts';
import { shots } from './shots';
import { shows } from './shows';
import { users } from './users';
import { valueChecks, valueColumns } from './value-columns';

/**
 * A value that somebody answered for: an immutable copy of all its numbers and inputs. Append-only; what is taken back stands in
 * `withdrawals`. Its id is the `value_id` of rows.
 */
export const approvals = pgTable(
  'approvals',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    /** Order in which approvals were made. */
    ordinal: bigint('ordinal', { mode: 'number' }).notNull().generatedAlwaysAsIdentity(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    assetId: uuid('asset_id')
      .notNull()
      .references(() => assets.id, { onDelete: 'restrict' }),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    /** Of a shot override: it may be locked in this shot alone. */
    shotId: uuid('shot_id').references(() => shots.id, { onDelete: 'restrict' }),
    versionId: uuid('version_id')
      .notNull()
      .references(() => assetVersions.id, { onDelete: 'restrict' }),
    geometryPartId: uuid('geometry_part_id').references(() => geometryParts.id, { onDelete: 'restrict' }),
    ...valueColumns(),
    /** The canonical text whose SHA-256 is value_sha256. */
    canonical: text('canonical').notNull(),
    /** Newest of the part's value_setters at the time: who set anything before it no longer counts as setter. */
    setterMark: bigint('setter_mark', { mode: 'number' }).notNull().default(0),
    faces: integer('faces').notNull(),
    maxValence: integer('max_valence').notNull(),
    note: text('note'),
    /** Of an approval that was carried over: the one it came from. */
    carriedFrom: uuid('carried_from').references((): AnyPgColumn => approvals.id, { onDelete: 'restrict' }),
    approvedBy: uuid('approved_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    approvedAt: timestamp('approved_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('approvals_ordinal_key').on(t.ordinal),
    index('approvals_part_idx').on(t.partId, t.ordinal),
    index('approvals_show_idx').on(t.showId, t.ordinal),
    ...valueChecks('approvals', t),
    check('approvals_complete', sql`${t.massKg} is not null`),
    check('approvals_hash', sql`${t.valueSha256} = encode(sha256(convert_to(${t.canonical}, 'UTF8')), 'hex')`),
  ],
);
