import type { Database } from '@/db/client';
import { tellOfImport } from '@/lib/notices/tell-of-import';
import type { TellImportJob } from '../registry';

/** Tells people of what an import moved. Done again it tells nobody again. */
export async function tellImportHandler(db: Database, job: TellImportJob): Promise<void> {
  await db.transaction((tx) => tellOfImport(tx, job));
}
