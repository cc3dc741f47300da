/** The validation as a command: what it prints, and how it ends. */
import { execFile } from 'node:child_process';
import { expect, test } from 'vitest';

interface Ended {
  readonly code: number | null;
  readonly output: string;
  readonly errors: string;
}

const run = (...args: readonly string[]): Promise<Ended> =>
  new Promise((done) => {
    const child = execFile(process.execPath, ['jobs/run.mjs', 'validate', ...args], (_, output, errors) =>
      done({ code: child.exitCode, output, errors }),
    );
  });

test.each([['--seeds=5-3'], ['--seeds=0-4'], ['--seeds=many'], ['--faster']])(
  'arguments that cannot be used end it with 2 before anything is computed: %s',
  async (argument) => {
    const { code, output, errors } = await run(argument);
    expect(code).toBe(2);
    expect(output).toBe('');
    expect(errors).toContain('usage: npm run validate');
  },
);

test('a quick run needs no database, judges no bound and ends with areas and list rates', async () => {
  const { code, output } = await run('--quick', '--seeds=301-330');
  expect(code).toBe(0);
  expect(output).toContain('seeds 301 to 301');
  expect(output).toContain('The bounds are not judged on fewer than 30 seeds.');
  expect(output.trimEnd().split('\n').at(-1)).toMatch(
    /^area \.\d{3}, best single measure \.\d{3} \(.+\); books with a list: without lifting \d+\.\d%, with lifting \d+\.\d%, with lifting and cushion seekers \d+\.\d%$/,
  );
}, 120_000);
