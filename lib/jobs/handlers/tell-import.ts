import type { Database } from '@/db/client';
import { tellImporter } from '@/lib/imports/tell-importer';
import { tellOfImport } from '@/lib/notices/tell-of-import';
import type { TellImportJob } from '../registry';

/** Tells people of what an import moved, and whoever opened it of its end. Done again it tells nobody again. */
export async function tellImportHandler(db: Database, job: TellImportJob): Promise<void> {
  await db.transaction(async (tx) => {
    await tellOfImport(tx, job);
    await tellImporter(tx, job);
  });
}
