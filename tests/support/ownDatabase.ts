/** A migrated database of a test file's own, for tests that look at every row there is. */
import { inject } from 'vitest';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { grantToApplication } from '../../src/server/db/grants.ts';
import { migrateUp } from '../../src/server/db/migrator.ts';
import { freshDatabase } from './localServer.ts';

/** Before anything reads the settings: they are read once. */
export async function useOwnDatabase(): Promise<{ readonly url: string; readonly ownerUrl: string }> {
  await closeDatabase();
  const { url, ownerUrl } = await freshDatabase(inject('databaseServer'));
  await migrateUp(ownerUrl);
  await grantToApplication(ownerUrl, url);
  process.env['DATABASE_URL'] = url;
  process.env['DATABASE_OWNER_URL'] = ownerUrl;
  return { url, ownerUrl };
}
