import { readdirSync, readFileSync } from 'node:fs';

const ignored = new Set([
  '.git',
  ...readFileSync('.gitignore', 'utf8')
    .split('\n')
    .map((line) => line.replaceAll('/', '').trim()),
]);

/** The files of the repository, without what .gitignore leaves out. Asks no git: a copy without it is tested too. */
export const repositoryFiles = (folder = ''): readonly string[] =>
  readdirSync(folder || '.', { withFileTypes: true })
    .filter(({ name }) => !ignored.has(name))
    .flatMap((entry) =>
      entry.isDirectory() ? repositoryFiles(`${folder}${entry.name}/`) : [`${folder}${entry.name}`],
    )
    .sort();
