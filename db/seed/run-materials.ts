import { closeDatabase, database } from '@/db/client';
import { seedMaterials } from './seed-materials';

/** Puts the studio's material library into a database that gets no demo show. */
try {
  await seedMaterials(database());
} catch (error) {
  console.error(error);
  process.exitCode = 1;
} finally {
  await closeDatabase();
}
