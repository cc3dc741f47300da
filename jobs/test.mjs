/**
 * npm test: everything that is checked, from a bare clone: what is missing is installed, the checks of `npm run
 * check` run, then every test on a real MariaDB, SMTP sink and Chromium. The last line is "N passed, N failed".
 *
 * With arguments (npm test -- --project unit) only the tests run, and the arguments go to vitest.
 */
import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { lastLine, totalsOf } from './testTotals.mjs';
import { StartFault, installModules, installPackages } from './packages.mjs';

const CHECKS = ['format:check', 'lint', 'types', 'orphans'];

process.chdir(fileURLToPath(new URL('..', import.meta.url)));
const say = (text) => console.log(text);
const args = process.argv.slice(2);

/** Runs to the end with what it prints passed through; the exit code. A signal to this process reaches it first. */
const finish = (program, programArgs, env = {}) =>
  new Promise((done, failed) => {
    const child = spawn(program, programArgs, { stdio: 'inherit', env: { ...process.env, ...env } });
    const pass = (signal) => child.kill(signal);
    process.on('SIGINT', pass).on('SIGTERM', pass);
    child.once('error', failed).once('exit', (code) => {
      process.off('SIGINT', pass).off('SIGTERM', pass);
      done(code ?? 1);
    });
  });

let failedChecks = 0;
let counted = null;
try {
  await prepare();
  if (args.length === 0) failedChecks = await runChecks();
  counted = await runTests();
} catch (error) {
  console.error(error instanceof StartFault ? error.message : error);
}
const totals = totalsOf({ counted, failedChecks, isCi: Boolean(process.env.CI) });
if (totals.skipped > 0) console.log(`${totals.skipped} skipped`);
console.log(lastLine(totals));
process.exitCode = totals.failed > 0 ? 1 : 0;

async function prepare() {
  await installModules(say);
  const missing = [
    ...(existsSync('/usr/sbin/mariadbd') ? [] : ['mariadb-server']),
    ...(process.env.CHROMIUM || existsSync('/usr/bin/chromium') ? [] : ['chromium']),
    // Recalculates the workbooks whose formulas are held against the product's figures.
    ...(existsSync('/usr/bin/soffice') ? [] : ['libreoffice-calc-nogui']),
  ];
  if (missing.length > 0)
    await installPackages(missing, 'the database, browser and spreadsheet program of the tests', say);
}

async function runChecks() {
  let failed = 0;
  for (const check of CHECKS) {
    say(`check: ${check}`);
    if ((await finish('npm', ['run', '--silent', check])) === 0) continue;
    failed += 1;
    say(`check ${check} FAILED`);
  }
  return failed;
}

async function runTests() {
  const folder = mkdtempSync(join(tmpdir(), 'underkeel-totals-'));
  const path = join(folder, 'totals.json');
  try {
    const code = await finish(
      'node',
      [
        'node_modules/vitest/vitest.mjs',
        'run',
        '--reporter=default',
        '--reporter=./tests/support/countReporter.ts',
        ...args,
      ],
      { TEST_TOTALS: path },
    );
    return { code, totals: existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : null };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
