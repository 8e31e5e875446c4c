import * as relations from './relations';
import { apiTokens } from './schema/api-tokens';
import { assetVersions } from './schema/asset-versions';
import { assets } from './schema/assets';
import { auditEvents } from './schema/audit-events';
import { auditItems } from './schema/audit-items';
import { blobs } from './schema/blobs';
import { findings } from './schema/findings';
import { geometryComponents } from './schema/geometry-components';
import { geometryParts } from './schema/geometry-parts';
import { geometryRecords } from './schema/geometry-records';
import { idempotencyKeys } from './schema/idempotency-keys';
import { importFiles } from './schema/import-files';
import { imports } from './schema/imports';
import { mails } from './schema/mails';
import { materials } from './schema/materials';
import { members } from './schema/members';
import { oneTimeLinks } from './schema/one-time-links';
import { partCurrent } from './schema/part-current';
import { parts } from './schema/parts';
import { receipts } from './schema/receipts';
import { settings } from './schema/settings';
import { shows } from './schema/shows';
import { signInAttempts } from './schema/sign-in-attempts';
import { users } from './schema/users';

/** Every table and relation under one name, as Drizzle's client wants it. */
export const schema = {
  apiTokens,
  assetVersions,
  assets,
  auditEvents,
  auditItems,
  blobs,
  findings,
  geometryComponents,
  geometryParts,
  geometryRecords,
  idempotencyKeys,
  importFiles,
  imports,
  mails,
  materials,
  members,
  oneTimeLinks,
  partCurrent,
  parts,
  receipts,
  settings,
  shows,
  signInAttempts,
  users,
  ...relations,
};
