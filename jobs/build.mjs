/** Builds the pages where their sources changed since the last build. Node builtins only. */
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { run } from './packages.mjs';
import { takePlace } from './place.mjs';

const SOURCES = ['src', 'public', 'package-lock.json', 'package.json', 'astro.config.mjs', 'tsconfig.json'];
const MARK = 'dist/.built-from';

/** The host name of APP_URL is part of it: which host names the pages answer to is fixed when they are built. */
function fingerprint(appUrl) {
  const hash = createHash('sha256').update(new URL(appUrl).hostname);
  const add = (path) => {
    if (statSync(path).isDirectory()) for (const name of readdirSync(path).sort()) add(join(path, name));
    else if (!/\.test\.tsx?$/.test(path)) hash.update(`\0${path}\0`).update(readFileSync(path));
  };
  SOURCES.filter((path) => existsSync(path)).forEach(add);
  return hash.digest('hex');
}

/** Two builds at once would write over each other: the second waits, and finds the work done. */
export async function buildPages(env, say, signal) {
  const wanted = fingerprint(env.APP_URL);
  const isBuilt = () => existsSync(MARK) && readFileSync(MARK, 'utf8') === wanted;
  let place = await takePlace('node_modules', { command: 'a build of the pages' });
  while (!place.isFree) {
    await sleep(500, undefined, { signal });
    place = await takePlace('node_modules', { command: 'a build of the pages' });
  }
  try {
    if (isBuilt()) return;
    say('building the pages');
    await run('node', ['node_modules/astro/astro.js', 'build', '--silent'], { env, signal });
    writeFileSync(MARK, wanted);
  } finally {
    place.leave();
  }
}
