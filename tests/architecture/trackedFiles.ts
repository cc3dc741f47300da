import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';

/** The files of the repository: what git keeps and what it would keep, without what is ignored or gone. */
export const trackedFiles = (): readonly string[] =>
  execFileSync('git', ['ls-files', '--cached', '--others', '--exclude-standard', '-z'], {
    encoding: 'utf8',
    maxBuffer: 2 ** 26,
  })
    .split('\0')
    .filter((file) => file !== '' && existsSync(file));
