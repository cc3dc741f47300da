/**
 * npm run NAME: runs jobs/NAME.ts with what it needs around it. A job that speaks to the database gets the local
 * one where DATABASE_URL is absent: the one that runs, or one that is started for it and stopped after it.
 */
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { runningDatabase } from './database.mjs';
import { StartFault, installModules, run } from './packages.mjs';
import { takePlace } from './place.mjs';

const NEEDS_NO_DATABASE = ['reference', 'readSheet', 'validate', 'fuzz'];
const say = (text) => console.error(text);

const [name = '', ...args] = process.argv.slice(2);
const told = new AbortController();
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => told.abort());
// Where the job reads files that the caller named, they are the caller's.
const callerFolder = process.env.INIT_CWD ?? process.cwd();
process.chdir(fileURLToPath(new URL('..', import.meta.url)));

let stop = async () => {};
try {
  await runJob();
} catch (error) {
  console.error(error instanceof StartFault ? error.message : error);
  process.exitCode = 1;
} finally {
  await stop();
}

async function runJob() {
  if (!/^[a-zA-Z]+$/.test(name) || !existsSync(`jobs/${name}.ts`))
    throw new StartFault(
      `There is no job "${name}". Jobs are the .ts files in jobs/ that package.json names.`,
    );
  if (existsSync('.env')) process.loadEnvFile('.env');
  await installModules(say, told.signal);
  const env = { LOG_LEVEL: 'warn', ...process.env, CALLER_FOLDER: callerFolder };
  if (!NEEDS_NO_DATABASE.includes(name)) Object.assign(env, await databaseSettings());
  await run('node', ['--import', 'tsx', `jobs/${name}.ts`, ...args], {
    env,
    signal: told.signal,
    stdio: 'inherit',
  }).catch((error) => {
    if (error.exitCode === undefined) throw error;
    process.exitCode = error.exitCode;
  });
}

async function databaseSettings() {
  const dataFolder = resolve(process.env.DATA_DIR ?? '.data');
  const { secrets, startLocalDatabase } = await import('./localDatabase.mjs');
  const known = { AUDIT_KEY: process.env.AUDIT_KEY ?? secrets(dataFolder).auditKey, DATA_DIR: dataFolder };
  if (process.env.DATABASE_URL) return known;
  const isStartedHere = await placeOrRunning(dataFolder);
  const database = await startLocalDatabase(dataFolder, say);
  if (isStartedHere) stop = database.stop;
  return { ...known, ...database.settings };
}

/** True where this command is the only one on the data folder; false once another's database answers. */
async function placeOrRunning(dataFolder) {
  for (let waited = 0; waited < 120; waited += 1) {
    const place = await takePlace(dataFolder, { command: `npm run ${name}` });
    if (place.isFree) return true;
    if (await runningDatabase(`${dataFolder}/db`)) return false;
    await sleep(500);
  }
  throw new StartFault('Another command is using the data folder and its database does not answer.');
}
