import { closeDatabase, database } from '@/db/client';
import { config } from '@/lib/config';
import { CREW, DEMO_PASSWORD } from './demo-crew';
import { DEMO_SHOW, seedDemo } from './seed-demo';

/** Makes the demo and prints, on stdout alone, what somebody who tries it has to know. */
async function run(): Promise<void> {
  const { toDrop } = await seedDemo(database(), config().dataFolder);
  const people = Object.values(CREW);
  const width = Math.max(...people.map((person) => person.email.length));
  console.log(`Demo show ${DEMO_SHOW}; everybody's password is ${DEMO_PASSWORD}`);
  for (const { email, name, trade } of people) console.log(`  ${email.padEnd(width)}  ${name}, ${trade}`);
  console.log(`A heavier ox to drop on the import page: ${toDrop}`);
}

try {
  await run();
} catch (error) {
  console.error(error);
  process.exitCode = 1;
} finally {
  await closeDatabase();
}
