/**
 * npm start: from a bare clone to a serving product, and again in seconds. With --dev the pages are served from
 * their sources. Node builtins only until the packages are installed; every step is skipped where it is done.
 */
import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { buildPages } from './build.mjs';
import { StartFault, installModules, run } from './packages.mjs';
import { takePlace } from './place.mjs';
import { needPort } from './ports.mjs';

const OLDEST_NODE = [20, 19];
const isDevelopment = process.argv.includes('--dev');
const began = performance.now();
const say = (text) =>
  console.log(`[${((performance.now() - began) / 1000).toFixed(0).padStart(3)} s] ${text}`);

process.chdir(fileURLToPath(new URL('..', import.meta.url)));

const told = new AbortController();
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => told.abort());

/** What has to be ended, the last first. */
const endings = [];
let exitCode = 0;
try {
  await start();
} catch (error) {
  if (!told.signal.aborted) {
    exitCode = 1;
    // A step that ended with a code has said itself what was wrong.
    const isSaid = error instanceof StartFault || error.exitCode !== undefined;
    console.error(isSaid ? `\n${error.message}` : error);
  }
}
for (const end of endings.reverse())
  await end().catch((error) => {
    exitCode = 1;
    console.error(error);
  });
process.exit(exitCode);

async function start() {
  checkNode();
  if (existsSync('.env')) process.loadEnvFile('.env');
  const dataFolder = resolve(process.env.DATA_DIR ?? '.data');
  const host = process.env.HOST ?? '127.0.0.1';
  const port = Number(process.env.PORT ?? 4321);
  const sinkPort = Number(process.env.MAIL_SINK_PORT ?? 4325);
  const appUrl = process.env.APP_URL ?? `http://${host === '0.0.0.0' ? '127.0.0.1' : host}:${port}`;
  const hasSink = !process.env.SMTP_URL;

  const place = await takePlace(dataFolder, { command: 'npm start', address: appUrl });
  if (!place.isFree) {
    console.log(alreadyThere(place.holder));
    if (!place.holder.address) exitCode = 1;
    return;
  }
  await needPort(host, port, 'PORT');
  if (hasSink) {
    await needPort('127.0.0.1', sinkPort, 'MAIL_SINK_PORT');
    await needPort('127.0.0.1', sinkPort + 1, 'MAIL_SINK_PORT');
  }
  await installModules(say, told.signal);
  told.signal.throwIfAborted();

  const env = await prepareSettings({ dataFolder, host, port, sinkPort, appUrl });
  say('bringing the schema up to date');
  await run('node', ['--import', 'tsx', 'jobs/migrate.ts'], { env, signal: told.signal });
  const signIns = await seed(env);
  if (!isDevelopment) await buildPages(env, say, told.signal);
  told.signal.throwIfAborted();

  say('starting the web process and the worker');
  await serveUntilTold(env, { host, port, sinkPort, appUrl, hasSink, signIns });
}

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major > OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor >= OLDEST_NODE[1])) return;
  throw new StartFault(
    `Underkeel needs Node ${OLDEST_NODE.join('.')} or newer; this is ${process.versions.node}.\nNothing was changed.`,
  );
}

function alreadyThere({ command, address }) {
  return address
    ? `Underkeel is already running at ${address}`
    : `${command} is using this data folder. Wait until it has ended, then start again.`;
}

async function prepareSettings({ dataFolder, host, port, sinkPort, appUrl }) {
  const { secrets, startLocalDatabase } = await import('./localDatabase.mjs');
  const given = process.env;
  const env = {
    ASTRO_TELEMETRY_DISABLED: '1',
    NODE_ENV: isDevelopment ? 'development' : 'production',
    LOG_LEVEL: 'warn',
    ...given,
    AUDIT_KEY: given.AUDIT_KEY ?? secrets(dataFolder).auditKey,
    DATA_DIR: dataFolder,
    HOST: host,
    PORT: String(port),
    MAIL_SINK_PORT: String(sinkPort),
    APP_URL: appUrl,
  };
  if (given.DATABASE_URL) return env;
  say('starting the database');
  const database = await startLocalDatabase(dataFolder, say);
  endings.push(database.stop);
  database.keepUp();
  return { ...env, ...database.settings, SEED_DEMO: given.SEED_DEMO ?? '1' };
}

/** The demo desk in a database of our own, or where it is asked for; otherwise an empty one says how it is set up. */
async function seed(env) {
  if (env.SEED_DEMO !== '1') {
    await eachLine('jobs/setUpLink.ts', env, (line) => console.log(line));
    return [];
  }
  say('demo desk');
  const signIns = [];
  await eachLine('seeders/index.ts', env, (line) => {
    if (line.startsWith('{"demoSignIns"')) signIns.push(...JSON.parse(line).demoSignIns);
    else say(line);
  });
  return signIns;
}

/** Runs a program of ours and hands over what it prints, line by line. */
async function eachLine(program, env, take) {
  const child = spawn('node', ['--import', 'tsx', program], {
    env,
    signal: told.signal,
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const ended = new Promise((done, failed) => child.once('error', failed).once('close', done));
  for await (const line of createInterface({ input: child.stdout })) take(line);
  const code = await ended;
  if (code !== 0) throw new StartFault(`${program} failed (${code}); what it said is above.`);
}

async function serveUntilTold(env, { host, port, sinkPort, appUrl, hasSink, signIns }) {
  const { serve, untilAnswers } = await import('./serve.mjs');
  const web = isDevelopment
    ? `node_modules/astro/astro.js dev --host ${host} --port ${port}`
    : '--import tsx jobs/server.ts';
  const { ended, stop } = serve(
    [
      ...(hasSink ? [{ name: 'mail', command: '--import tsx jobs/mailSink.ts' }] : []),
      { name: 'worker', command: '--import tsx jobs/worker.ts' },
      { name: 'web', command: web },
    ],
    // The owner of the schema is for the step before: what serves cannot change it.
    { ...env, DATABASE_OWNER_URL: undefined },
    isDevelopment ? 0 : 3,
  );
  endings.push(async () => {
    stop();
    await ended;
  });
  let isOver = false;
  void ended.then(() => (isOver = true));
  const stopWaiting = () => isOver || told.signal.aborted;
  const local = `http://${host === '0.0.0.0' ? '127.0.0.1' : host}:${port}`;
  const isUp =
    (!hasSink || (await untilAnswers(`http://127.0.0.1:${sinkPort + 1}/`, stopWaiting))) &&
    (await untilAnswers(`${local}/livez`, stopWaiting));
  if (isUp) announce({ sinkPort, appUrl, hasSink, signIns });
  else if (!told.signal.aborted) throw new StartFault('The product did not come up; what failed is above.');
  const isClean = await ended;
  if (!isClean && !told.signal.aborted)
    throw new StartFault('A process of the product failed several times; what it said is above.');
}

function announce({ sinkPort, appUrl, hasSink, signIns }) {
  say('up');
  if (signIns.length > 0) console.log('\nDemo sign-ins:');
  const width = (name) => Math.max(...signIns.map((signIn) => signIn[name].length)) + 2;
  for (const { role, email, password } of signIns)
    console.log(`  ${role.padEnd(width('role'))}${email.padEnd(width('email'))}${password}`);
  if (hasSink) console.log(`\nMail sink: http://127.0.0.1:${sinkPort + 1}/ (mail stays on this machine)`);
  console.log(`\nUnderkeel: ${appUrl}`);
}
