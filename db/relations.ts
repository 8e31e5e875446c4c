import { relations } from 'drizzle-orm';
import { assetVersions } from './schema/asset-versions';
import { assets } from './schema/assets';
import { geometryComponents } from './schema/geometry-components';
import { geometryParts } from './schema/geometry-parts';
import { geometryRecords } from './schema/geometry-records';
import { findings } from './schema/findings';
import { parts } from './schema/parts';
import { settings } from './schema/settings';
import { shows } from './schema/shows';

export const showRelations = relations(shows, ({ many }) => ({ assets: many(assets) }));

export const assetRelations = relations(assets, ({ one, many }) => ({
  show: one(shows, { fields: [assets.showId], references: [shows.id] }),
  versions: many(assetVersions),
  parts: many(parts),
}));

export const assetVersionRelations = relations(assetVersions, ({ one }) => ({
  asset: one(assets, { fields: [assetVersions.assetId], references: [assets.id] }),
  record: one(geometryRecords, { fields: [assetVersions.recordId], references: [geometryRecords.id] }),
}));

export const geometryRecordRelations = relations(geometryRecords, ({ many }) => ({
  parts: many(geometryParts),
  findings: many(findings),
}));

export const geometryPartRelations = relations(geometryParts, ({ one, many }) => ({
  record: one(geometryRecords, { fields: [geometryParts.recordId], references: [geometryRecords.id] }),
  components: many(geometryComponents),
}));

export const geometryComponentRelations = relations(geometryComponents, ({ one }) => ({
  part: one(geometryParts, { fields: [geometryComponents.partId], references: [geometryParts.id] }),
}));

export const findingRelations = relations(findings, ({ one }) => ({
  record: one(geometryRecords, { fields: [findings.recordId], references: [geometryRecords.id] }),
}));

export const partRelations = relations(parts, ({ one, many }) => ({
  asset: one(assets, { fields: [parts.assetId], references: [assets.id] }),
  settings: many(settings),
}));
