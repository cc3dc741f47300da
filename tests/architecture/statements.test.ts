/** How the database is spoken to, read from the sources: every raw query says its kind, every edit raises its version. */
import { readFileSync } from 'node:fs';
import ts from 'typescript';
import { expect, test } from 'vitest';
import { MIGRATIONS } from '../../src/server/db/migrator.ts';
import { repositoryFiles } from './repositoryFiles.ts';

const sources = repositoryFiles().filter((path) => /^(src|jobs|seeders)\/.*\.ts$/.test(path));

/** Line numbers of `….query(…)` without `type: QueryTypes.…`: the driver breaks on what such a read answers. */
function untypedQueries(text: string): number[] {
  const source = ts.createSourceFile('file.ts', text, ts.ScriptTarget.Latest, true);
  const lines: number[] = [];
  const visit = (node: ts.Node): void => {
    if (
      ts.isCallExpression(node) &&
      ts.isPropertyAccessExpression(node.expression) &&
      node.expression.name.text === 'query' &&
      !node.arguments.some(saysItsKind)
    )
      lines.push(source.getLineAndCharacterOfPosition(node.getStart()).line + 1);
    node.forEachChild(visit);
  };
  visit(source);
  return lines;
}

const saysItsKind = (argument: ts.Expression): boolean =>
  ts.isObjectLiteralExpression(argument) &&
  argument.properties.some(
    (property) =>
      ts.isPropertyAssignment(property) &&
      property.name.getText() === 'type' &&
      property.initializer.getText().startsWith('QueryTypes.'),
  );

/** Edits of a row that people edit too and that leave its version as it is. */
function updatesWithoutVersion(text: string): string[] {
  const source = ts.createSourceFile('file.ts', text, ts.ScriptTarget.Latest, true);
  const found: string[] = [];
  const visit = (node: ts.Node): void => {
    const words = ts.isStringLiteralLike(node) || ts.isTemplateExpression(node) ? node.getText() : '';
    const table = /^['`]\s*update (\w+)\s+set\b/.exec(words)?.[1] ?? '';
    if (versioned.has(table) && !words.includes('version = version + 1'))
      found.push(words.replaceAll(/\s+/g, ' ').slice(1, -1));
    node.forEachChild(visit);
  };
  visit(source);
  return found;
}

const versioned = new Set(
  MIGRATIONS.flatMap((migration) => migration.up).flatMap((statement) => {
    const table = /create table if not exists (\w+)/.exec(statement)?.[1];
    return table && /\bversion int unsigned not null default 1\b/.test(statement) ? [table] : [];
  }),
);

test('every raw query says which kind of statement it is', () => {
  const found = sources.flatMap((path) =>
    untypedQueries(readFileSync(path, 'utf8')).map((line) => `${path}:${line}`),
  );
  expect(found).toEqual([]);
});

test('an untyped query would be seen', () => {
  expect(untypedQueries(`a.query('select 1');\nb.query('x', { type: QueryTypes.SELECT });`)).toEqual([1]);
  expect(untypedQueries(`pool.query<Row>(\n  sql,\n  { bind },\n)`)).toEqual([1]);
});

/** What the product keeps in such a row for itself: nobody edits it, so nobody's look at the row grows old. */
const KEPT_BY_THE_PRODUCT = [
  'update alerts set last_seen_at = :now,',
  'update people set unsubscribe_token_hash = :tokenHash',
  'update runs set cross_section_id = :crossSectionId',
  'update runs set borrowers_done = ',
];

test('every edit of a row with a version raises it in the same statement', () => {
  const found = sources
    .filter((path) => path.startsWith('src/'))
    .flatMap((path) => updatesWithoutVersion(readFileSync(path, 'utf8')))
    .filter((text) => !KEPT_BY_THE_PRODUCT.some((start) => text.startsWith(start)));
  expect(found).toEqual([]);
  expect(versioned.size).toBeGreaterThan(10);
});

test('an edit that leaves the version would be seen', () => {
  expect(updatesWithoutVersion("execute(tx, 'update alerts set state = :state where id = :id')")).toEqual([
    'update alerts set state = :state where id = :id',
  ]);
  expect(updatesWithoutVersion('execute(tx, `update alerts set version = version + 1`)')).toEqual([]);
});
