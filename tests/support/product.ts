/**
 * Set-up of the project `product`: a database of its own with the demo desk as of a pinned day, the built product on
 * a free port, its worker and its mail sink, each a process as in real life.
 */
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, openSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import type { TestProject } from 'vitest/node';
import { buildPages } from '../../jobs/build.mjs';
import { answers, freePort } from '../../jobs/database.mjs';
import { untilAnswers } from '../../jobs/serve.mjs';
import { grantToApplication } from '../../src/server/db/grants.ts';
import { migrateUp } from '../../src/server/db/migrator.ts';
import { AUDIT_KEY } from './auditKey.ts';
import { freshDatabase, holdServer, releaseServer } from './localServer.ts';

export interface DemoSignIn {
  readonly role: string;
  readonly email: string;
  readonly password: string;
}

declare module 'vitest' {
  interface ProvidedContext {
    /** The mail sink's page, without a slash at the end. */
    sinkUrl: string;
    demoSignIns: readonly DemoSignIn[];
    /** The settings that the product runs with, for tests that start a process of their own. */
    productSettings: Readonly<Record<string, string>>;
    /** What the product's processes have written, for a test that fails. */
    productLog: string;
  }
}

/** Everything that the demo desk holds is dated from here, and here the product's clock stands when it starts. */
const SEED_DAY = '2026-12-01';
const MORNING = Date.parse(`${SEED_DAY}T09:00:00Z`);
const PINNED_CLOCK = new URL('./pinnedClock.mjs', import.meta.url).href;

const processes: ChildProcess[] = [];
let folder: string | null = null;

export async function setup(project: TestProject): Promise<void> {
  const server = await holdServer();
  const { url, ownerUrl } = await freshDatabase(server);
  await migrateUp(ownerUrl);
  await grantToApplication(ownerUrl, url);
  folder = mkdtempSync(join(tmpdir(), 'underkeel-product-'));
  const port = await freePort();
  const sinkPort = await freePairOfPorts();
  const baseUrl = `http://127.0.0.1:${port}`;
  const settings: Record<string, string> = {
    DATABASE_URL: url,
    DATABASE_OWNER_URL: ownerUrl,
    AUDIT_KEY,
    APP_URL: baseUrl,
    PORT: String(port),
    MAIL_SINK_PORT: String(sinkPort),
    DATA_DIR: folder,
    SEED_DAY,
    CLOCK_OFFSET_MS: String(MORNING - Date.now()),
    NODE_OPTIONS: `--import ${PINNED_CLOCK}`,
    NIGHT_SCHEDULE: '0',
    LOG_LEVEL: 'warn',
    NODE_ENV: 'production',
    ASTRO_TELEMETRY_DISABLED: '1',
  };
  const env = { ...process.env, ...settings };
  const [demoSignIns] = await Promise.all([seed(env), buildPages(env, () => undefined)]);

  const log = join(folder, 'product.log');
  for (const name of ['mailSink', 'server', 'worker']) start(name, env, log);
  const sinkUrl = `http://127.0.0.1:${sinkPort + 1}`;
  const isOver = () => processes.some(({ exitCode }) => exitCode !== null);
  for (const address of [`${sinkUrl}/`, `${baseUrl}/livez`])
    if (!(await untilAnswers(address, isOver)))
      throw new Error(`the product did not come up:\n${readFileSync(log, 'utf8').slice(-4_000)}`);

  project.provide('baseUrl', baseUrl);
  project.provide('sinkUrl', sinkUrl);
  project.provide('demoSignIns', demoSignIns);
  project.provide('productSettings', settings);
  project.provide('productLog', log);
  project.provide('databaseUrl', url);
  project.provide('databaseOwnerUrl', ownerUrl);
  project.provide('databaseServer', {
    port: server.port,
    socket: server.socket,
    adminUser: server.adminUser,
  });
}

export async function teardown(): Promise<void> {
  for (const child of processes.splice(0)) {
    if (child.exitCode !== null || child.signalCode !== null) continue;
    const ended = once(child, 'exit');
    child.kill('SIGTERM');
    await ended;
  }
  await releaseServer();
  if (folder) rmSync(folder, { recursive: true, force: true });
}

function start(name: string, env: NodeJS.ProcessEnv, log: string): void {
  const out = openSync(log, 'a');
  processes.push(
    spawn(process.execPath, ['--import', 'tsx', `jobs/${name}.ts`], {
      env: { ...env, UNDERKEEL_SUPERVISED: '1' },
      // The standard input stays open as long as this process lives: a killed test run leaves nothing behind.
      stdio: ['pipe', out, out],
    }),
  );
}

async function seed(env: NodeJS.ProcessEnv): Promise<DemoSignIn[]> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'seeders/index.ts'], {
    env,
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const closed = once(child, 'close');
  let signIns: DemoSignIn[] = [];
  for await (const line of createInterface({ input: child.stdout }))
    if (line.startsWith('{"demoSignIns"'))
      signIns = (JSON.parse(line) as { demoSignIns: DemoSignIn[] }).demoSignIns;
  const [code] = (await closed) as [number | null];
  if (code !== 0) throw new Error(`the demo desk could not be laid out (${code})`);
  return signIns;
}

/** The sink takes two ports in a row. */
export async function freePairOfPorts(): Promise<number> {
  for (;;) {
    const port = await freePort();
    if (!(await answers(port + 1))) return port;
  }
}
