/** Brings the database up to date, puts the demo into an empty one where that is allowed, and prints the result as JSON. */
import { openDatabase } from '@/db/client';
import { migrateDatabase } from '@/db/migrate';
import { seedDemo } from '@/lib/server/seed/seed';

try {
  const handle = await openDatabase();
  try {
    await migrateDatabase(handle);
    console.log(JSON.stringify(await seedDemo(handle)));
  } finally {
    handle.close();
  }
} catch (error) {
  console.error(`The database could not be opened: ${error instanceof Error ? error.message : String(error)}`);
  process.exitCode = 1;
}
