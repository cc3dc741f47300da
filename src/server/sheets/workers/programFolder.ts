/**
 * The folder of the program, found by its package.json from wherever this code runs: the sources under tsx, or the
 * bundled server in dist. Workers are started from the sources in both.
 */
import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

let found: string | null = null;

export function programFolder(): string {
  found ??= folderAbove(dirname(fileURLToPath(import.meta.url)));
  return found;
}

function folderAbove(start: string): string {
  for (let folder = start; ; folder = dirname(folder)) {
    if (isProgram(join(folder, 'package.json'))) return folder;
    if (dirname(folder) === folder) throw new Error(`no package.json of the program above ${start}`);
  }
}

function isProgram(path: string): boolean {
  if (!existsSync(path)) return false;
  const content: unknown = JSON.parse(readFileSync(path, 'utf8'));
  return typeof content === 'object' && content !== null && 'name' in content && content.name === 'underkeel';
}
