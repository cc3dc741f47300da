/** Brings the schema up to date as the owner and gives the application's user its rights. Exit code 1 where it fails. */
import { env } from '../src/server/config/env.ts';
import { grantToApplication } from '../src/server/db/grants.ts';
import { migrateUp } from '../src/server/db/migrator.ts';

const { DATABASE_URL, DATABASE_OWNER_URL } = env();
const ownerUrl = DATABASE_OWNER_URL ?? DATABASE_URL;
const applied = await migrateUp(ownerUrl);
if (new URL(ownerUrl).username !== new URL(DATABASE_URL).username)
  await grantToApplication(ownerUrl, DATABASE_URL);
console.log(applied.length === 0 ? 'schema is up to date' : `schema: applied ${applied.join(', ')}`);
