import * as relations from './relations';
import { apiTokens } from './schema/api-tokens';
import { approvalRequests } from './schema/approval-requests';
import { approvals } from './schema/approvals';
import { assetVersions } from './schema/asset-versions';
import { assets } from './schema/assets';
import { auditEvents } from './schema/audit-events';
import { auditItems } from './schema/audit-items';
import { blobs } from './schema/blobs';
import { fileFaults } from './schema/file-faults';
import { findings } from './schema/findings';
import { geometryComponents } from './schema/geometry-components';
import { geometryParts } from './schema/geometry-parts';
import { geometryRecords } from './schema/geometry-records';
import { idempotencyKeys } from './schema/idempotency-keys';
import { importFiles } from './schema/import-files';
import { imports } from './schema/imports';
import { lockClaims } from './schema/lock-claims';
import { locks } from './schema/locks';
import { mails } from './schema/mails';
import { materials } from './schema/materials';
import { members } from './schema/members';
import { notices } from './schema/notices';
import { oneTimeLinks } from './schema/one-time-links';
import { partCurrent } from './schema/part-current';
import { partRenames } from './schema/part-renames';
import { parts } from './schema/parts';
import { peopleTold } from './schema/people-told';
import { queueTurns } from './schema/queue-turns';
import { receiptRows } from './schema/receipt-rows';
import { receipts } from './schema/receipts';
import { settings } from './schema/settings';
import { shotAssets } from './schema/shot-assets';
import { shotOverrides } from './schema/shot-overrides';
import { shots } from './schema/shots';
import { shows } from './schema/shows';
import { signInAttempts } from './schema/sign-in-attempts';
import { storageUsage } from './schema/storage-usage';
import { uploadParts } from './schema/upload-parts';
import { uploads } from './schema/uploads';
import { users } from './schema/users';
import { valueSetters } from './schema/value-setters';
import { withdrawals } from './schema/withdrawals';
import { workers } from './schema/workers';

/** Every table and relation under one name, as Drizzle's client wants it. */
export const schema = {
  apiTokens,
  approvalRequests,
  approvals,
  assetVersions,
  assets,
  auditEvents,
  auditItems,
  blobs,
  fileFaults,
  findings,
  geometryComponents,
  geometryParts,
  geometryRecords,
  idempotencyKeys,
  importFiles,
  imports,
  lockClaims,
  locks,
  mails,
  materials,
  members,
  notices,
  oneTimeLinks,
  partCurrent,
  partRenames,
  parts,
  peopleTold,
  queueTurns,
  receiptRows,
  receipts,
  settings,
  shotAssets,
  shotOverrides,
  shots,
  shows,
  signInAttempts,
  storageUsage,
  uploadParts,
  uploads,
  users,
  valueSetters,
  withdrawals,
  workers,
  ...relations,
};
