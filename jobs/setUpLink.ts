/** Prints the one-time link to the set-up page where nobody is in the database yet. */
import { closeDatabase } from '../src/server/db/connection.ts';
import { makeSetUpLink } from '../src/server/services/setUp.ts';

const link = await makeSetUpLink(new Date());
if (link) console.log(`This database is empty. Set Underkeel up within a day at: ${link}`);
await closeDatabase();
