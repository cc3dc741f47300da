/** The local MariaDB of this checkout: found, installed, started on loopback and stopped. Node builtins only. */
import { spawn, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  chmodSync,
  chownSync,
  existsSync,
  mkdirSync,
  openSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { connect, createServer } from 'node:net';
import { tmpdir, userInfo } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { installPackages } from './packages.mjs';

const isRoot = process.getuid?.() === 0;
/** A unix socket's path holds 107 bytes. */
const SOCKET_PATH_MOST = 100;
const START_SECONDS = 60;

const program = (name) =>
  ['/usr/sbin', '/usr/bin', '/usr/libexec'].map((dir) => join(dir, name)).find(existsSync);
const hashOf = (text) => createHash('sha256').update(text).digest('hex').slice(0, 12);

/** @returns {Promise<number>} a port on loopback that nobody listens on */
export const freePort = () =>
  new Promise((found, failed) => {
    const server = createServer().once('error', failed);
    server.listen(0, '127.0.0.1', () => {
      const { port } = /** @type {import('node:net').AddressInfo} */ (server.address());
      server.close(() => found(port));
    });
  });

/** @returns {Promise<boolean>} */
export const answers = (port) =>
  new Promise((done) => {
    const socket = connect(port, '127.0.0.1')
      .once('connect', () => {
        socket.destroy();
        done(true);
      })
      .once('error', () => done(false));
  });

/** The server refuses to run as root: under root it runs as the account that Debian makes for it. */
function account() {
  if (!isRoot) return {};
  const idOf = (flag) => Number(spawnSync('id', [flag, 'mysql']).stdout);
  const [uid, gid] = [idOf('-u'), idOf('-g')];
  if (!uid) throw new Error('there is no account "mysql": apt-get install mariadb-server makes it');
  return { uid, gid };
}

/** Where the data goes: the folder asked for, or /var/lib where the server's account cannot reach that folder. */
function reachable(directory, as) {
  if (as.uid === undefined) return directory;
  let existing = directory;
  while (!existsSync(existing)) existing = dirname(existing);
  const canEnter = spawnSync('/usr/bin/test', ['-x', existing], { uid: as.uid, gid: as.gid }).status === 0;
  return canEnter ? directory : join('/var/lib', `underkeel-${hashOf(directory)}`);
}

/** A folder that only the server's account can enter. */
function privateFolder(path, as) {
  mkdirSync(path, { recursive: true, mode: 0o700 });
  if (as.uid !== undefined) chownSync(path, as.uid, as.gid);
  chmodSync(path, 0o700);
}

function socketFor(directory, as) {
  const near = join(directory, 's');
  if (near.length <= SOCKET_PATH_MOST) return near;
  const short = join(tmpdir().length < 40 ? tmpdir() : '/tmp', `underkeel-${hashOf(directory)}`);
  privateFolder(short, as);
  return join(short, 's');
}

function commandLine(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0');
  } catch (error) {
    if (error.code === 'ENOENT' || error.code === 'ESRCH') return [];
    throw error;
  }
}

const isServerOf = (pid, data) => commandLine(pid).includes(`--datadir=${data}`);

async function endProcess(pid, data) {
  const endAndWait = async (signal, seconds) => {
    if (isServerOf(pid, data)) process.kill(pid, signal);
    for (let waited = 0; waited < seconds * 20 && isServerOf(pid, data); waited += 1) await sleep(50);
    return !isServerOf(pid, data);
  };
  if (!(await endAndWait('SIGTERM', 30)) && !(await endAndWait('SIGKILL', 10)))
    throw new Error(`the database server (process ${pid}) does not end`);
}

/**
 * The server that this folder's last start left behind, if its process and its port answer; one that runs and
 * does not answer is ended.
 * @returns {Promise<null | { pid: number, port: number, socket: string }>}
 */
export async function runningDatabase(directory) {
  const home = reachable(resolve(directory), isRoot && program('mariadbd') ? account() : {});
  const note = join(home, 'server.json');
  if (!existsSync(note)) return null;
  const { pid, port, socket } = JSON.parse(readFileSync(note, 'utf8'));
  const data = join(home, 'data');
  if (!isServerOf(pid, data)) return null;
  for (let waited = 0; waited < 100; waited += 1) {
    if (await answers(port)) return { pid, port, socket };
    await sleep(100);
  }
  await endProcess(pid, data);
  return null;
}

function initialise(data, as) {
  if (existsSync(join(data, 'mysql', 'global_priv.MAD'))) return;
  rmSync(data, { recursive: true, force: true });
  const made = spawnSync(
    program('mariadb-install-db'),
    [
      '--no-defaults',
      `--datadir=${data}`,
      '--auth-root-authentication-method=socket',
      ...(isRoot ? [] : [`--auth-root-socket-user=${userInfo().username}`]),
      '--skip-test-db',
      '--skip-name-resolve',
    ],
    { ...as, encoding: 'utf8' },
  );
  if (made.status === 0) return;
  rmSync(data, { recursive: true, force: true });
  throw new Error(`the database could not be set up in ${data}:\n${made.stdout}${made.stderr}`);
}

/** Durable and strict; `fast` gives up durability for tests that throw the data away. */
const serverFlags = ({ data, port, socket, pidFile, fast, bufferPool }) => [
  '--no-defaults',
  `--datadir=${data}`,
  `--port=${port}`,
  '--bind-address=127.0.0.1',
  `--socket=${socket}`,
  `--pid-file=${pidFile}`,
  '--skip-name-resolve',
  '--skip-log-bin',
  '--performance-schema=OFF',
  '--character-set-server=utf8mb4',
  '--collation-server=utf8mb4_unicode_ci',
  '--default-time-zone=+00:00',
  '--sql-mode=STRICT_ALL_TABLES,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION',
  `--innodb-buffer-pool-size=${bufferPool}`,
  '--max-allowed-packet=64M',
  '--innodb-force-primary-key=ON',
  '--innodb-rollback-on-timeout=ON',
  '--innodb-lock-wait-timeout=10',
  '--innodb-snapshot-isolation=ON',
  '--innodb-print-all-deadlocks=ON',
  ...(fast
    ? ['--innodb-flush-log-at-trx-commit=0', '--innodb-flush-method=nosync', '--innodb-doublewrite=0']
    : ['--innodb-flush-log-at-trx-commit=1']),
];

async function untilOpen(child, port, log) {
  let ended = null;
  child.once('exit', (code, signal) => (ended = code ?? signal));
  for (let waited = 0; waited < START_SECONDS * 20; waited += 1) {
    if (ended !== null)
      throw new Error(
        `the database server ended at once (${ended}):\n${readFileSync(log, 'utf8').slice(-2000)}`,
      );
    if (await answers(port)) return;
    await sleep(50);
  }
  child.kill('SIGKILL');
  throw new Error(`the database server did not open port ${port} in ${START_SECONDS} s; its log is ${log}`);
}

/**
 * Starts the server on this folder, or takes over the one that runs on it.
 * @param {{ directory: string, port?: number, fast?: boolean, bufferPool?: string, say?: (text: string) => void }} options
 * @returns {Promise<{ pid: number, port: number, socket: string, adminUser: string, isRunning: () => boolean, stop: () => Promise<void>, kill: () => Promise<void> }>}
 */
export async function startDatabase({ directory, port, fast = false, bufferPool = '256M', say = () => {} }) {
  if (!program('mariadbd') || !program('mariadb-install-db'))
    await installPackages(['mariadb-server'], 'the database server MariaDB', say);
  const as = account();
  const home = reachable(resolve(directory), as);
  if (home !== resolve(directory)) say(`the server's account cannot enter this folder: data goes to ${home}`);
  const data = join(home, 'data');
  const handle = ({ pid, port, socket }) => ({
    pid,
    port,
    socket,
    // Over the unix socket the server believes the operating system about who asks.
    adminUser: isRoot ? 'root' : userInfo().username,
    isRunning: () => isServerOf(pid, data),
    stop: () => endProcess(pid, data),
    kill: async () => {
      if (isServerOf(pid, data)) process.kill(pid, 'SIGKILL');
      while (isServerOf(pid, data)) await sleep(20);
    },
  });
  const left = await runningDatabase(directory);
  if (left) return handle(left);

  privateFolder(home, as);
  initialise(data, as);
  port ??= await freePort();
  const socket = socketFor(home, as);
  const log = join(home, 'mariadbd.log');
  const out = openSync(log, 'a');
  const flags = serverFlags({ data, port, socket, pidFile: join(home, 'pid'), fast, bufferPool });
  // A group of its own: Ctrl-C must reach the programs that use the database before the database.
  const child = spawn(program('mariadbd'), flags, { ...as, stdio: ['ignore', out, out], detached: true });
  child.unref();
  await untilOpen(child, port, log);
  const note = join(home, 'server.json');
  writeFileSync(`${note}.new`, JSON.stringify({ pid: child.pid, port, socket }));
  renameSync(`${note}.new`, note);
  return handle({ pid: child.pid, port, socket });
}
