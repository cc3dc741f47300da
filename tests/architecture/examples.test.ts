/**
 * Every `@example` in core's docstrings runs, and every exported function of core has one.
 *
 * An example is one expression and what it gives: `mean([1, 2, 3]) // => 2`. Names that stand free are exports of its
 * own module or of src/core/example.fixture.ts. A decimal is written as a number; `0.12…` stands for a number that
 * begins so, `{ a: 1, … }` and `[1, …]` for what holds at least that.
 */
import { readFileSync } from 'node:fs';
import { inspect } from 'node:util';
import ts from 'typescript';
import { describe, expect, test } from 'vitest';
import * as fixture from '../../src/core/example.fixture.ts';
import { Decimal } from '../../src/core/money/decimal.ts';
import { agrees, Beginning, evaluate, marked, plain, REST } from './coreExamples.ts';
import { repositoryFiles } from './repositoryFiles.ts';

interface CoreFunction {
  readonly file: string;
  readonly name: string;
  readonly hasDocstring: boolean;
  readonly examples: readonly string[];
}

const modules = repositoryFiles().filter(
  (file) => file.startsWith('src/core/') && /(?<!\.test|\.fixture)\.ts$/.test(file),
);
const functions = modules.flatMap(exportedFunctions);

test('there are modules and functions to look at', () => {
  expect(modules.length).toBeGreaterThan(50);
  expect(functions.length).toBeGreaterThan(100);
});

test('every exported function of core has a docstring with an example', () => {
  const without = functions.filter(({ hasDocstring, examples }) => !hasDocstring || examples.length === 0);
  expect(without.map(({ file, name }) => `${file}: ${name}`)).toEqual([]);
});

describe.each(functions.filter(({ examples }) => examples.length > 0))(
  '$file $name',
  ({ file, examples }) => {
    test.each(examples)('%s', async (example) => {
      const [expression, expected] = parts(example);
      const exported = (await import(`../../${file}`)) as Record<string, unknown>;
      const scope = { ...fixture, ...exported };
      const actual = plain(evaluate(expression, scope));
      const wanted = evaluate(marked(expected), { begins: (text: string) => new Beginning(text), REST });
      expect(agrees(actual, wanted), `it gives ${inspect(actual, { depth: 6, breakLength: 100 })}`).toBe(
        true,
      );
    });
  },
);

test('an example that does not hold is seen', () => {
  expect(agrees(plain(new Decimal('0.25')), 0.25)).toBe(true);
  expect(agrees(0.25, 0.26)).toBe(false);
  expect(agrees(0.0388349, new Beginning('0.0388'))).toBe(true);
  expect(agrees(0.0389, new Beginning('0.0388'))).toBe(false);
  expect(agrees({ a: 1, b: 2 }, { a: 1 })).toBe(false);
  expect(agrees({ a: 1, b: 2 }, { a: 1, [REST]: true })).toBe(true);
  expect(agrees([1, 2], [1])).toBe(false);
  expect(agrees(undefined, null)).toBe(false);
});

function exportedFunctions(file: string): readonly CoreFunction[] {
  const source = ts.createSourceFile(file, readFileSync(file, 'utf8'), ts.ScriptTarget.Latest, true);
  return source.statements.flatMap((statement) => {
    const isExported =
      ts.canHaveModifiers(statement) &&
      ts.getModifiers(statement)?.some(({ kind }) => kind === ts.SyntaxKind.ExportKeyword);
    const name = isExported ? nameOfFunction(statement) : null;
    if (name === null) return [];
    const docs = ts.getJSDocCommentsAndTags(statement).filter(ts.isJSDoc);
    const tags = docs.flatMap((doc) => doc.tags ?? []).filter(({ tagName }) => tagName.text === 'example');
    return {
      file,
      name,
      hasDocstring: docs.some((doc) => ts.getTextOfJSDocComment(doc.comment)),
      examples: tags.map((tag) => (ts.getTextOfJSDocComment(tag.comment) ?? '').replaceAll(/\s*\n\s*/g, ' ')),
    };
  });
}

function nameOfFunction(statement: ts.Statement): string | null {
  if (ts.isFunctionDeclaration(statement)) return statement.name?.text ?? null;
  if (!ts.isVariableStatement(statement)) return null;
  const [declaration] = statement.declarationList.declarations;
  const isFunction = declaration?.initializer && ts.isArrowFunction(declaration.initializer);
  return isFunction && ts.isIdentifier(declaration.name) ? declaration.name.text : null;
}

function parts(example: string): readonly [expression: string, expected: string] {
  const at = example.lastIndexOf('// =>');
  if (at < 0) throw new Error(`say what it gives, behind // =>: ${example}`);
  return [example.slice(0, at).trim(), example.slice(at + '// =>'.length).trim()];
}
