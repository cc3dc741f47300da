/**
 * Every `@example` in core's docstrings runs, and every exported function of core has one.
 *
 * An example is one expression and what it gives: `mean([1, 2, 3]) // => 2`. Names that stand free are exports of its
 * own module or of src/core/example.fixture.ts. A decimal is written as a number; `0.12…` stands for a number that
 * begins so, `{ a: 1, … }` and `[1, …]` for what holds at least that.
 */
import { readFileSync } from 'node:fs';
import { inspect } from 'node:util';
import { compileFunction } from 'node:vm';
import ts from 'typescript';
import { describe, expect, test } from 'vitest';
import * as fixture from '../../src/core/example.fixture.ts';
import { Decimal } from '../../src/core/money/decimal.ts';
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

const evaluate = (expression: string, scope: Readonly<Record<string, unknown>>): unknown =>
  (compileFunction(`return (${expression});`, Object.keys(scope)) as (...values: unknown[]) => unknown)(
    ...Object.values(scope),
  );

const REST = Symbol('and more');

/** A number of which only the first digits are written. */
class Beginning {
  constructor(readonly text: string) {}
}

/** `0.12…` and `…` at the end of a list or record, made into what evaluates. */
const marked = (expected: string): string =>
  expected
    .replaceAll(/(-?\d+(?:\.\d+)?)…/g, "begins('$1')")
    .replaceAll(/,\s*…\s*\}/g, ', [REST]: true }')
    .replaceAll(/,\s*…\s*\]/g, ', REST]');

/** Decimals as numbers and instants as text, all the way down. */
function plain(value: unknown): unknown {
  if (value instanceof Decimal) return value.toNumber();
  if (value instanceof Date) return value.toISOString();
  if (value instanceof Map) return plain([...value]);
  if (ArrayBuffer.isView(value)) return Array.from(value as Float64Array);
  if (Array.isArray(value)) return value.map(plain);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, member]) => [key, plain(member)]));
}

function agrees(actual: unknown, wanted: unknown): boolean {
  if (wanted instanceof Beginning)
    return typeof actual === 'number' && String(actual).startsWith(wanted.text);
  if (typeof actual === 'number' && typeof wanted === 'number')
    return Object.is(actual, wanted) || Math.abs(actual - wanted) <= 1e-12 * Math.abs(wanted);
  if (Array.isArray(wanted)) {
    const members: unknown[] = wanted.filter((member) => member !== REST);
    return (
      Array.isArray(actual) &&
      (actual.length === members.length || (wanted.includes(REST) && actual.length > members.length)) &&
      members.every((member, place) => agrees(actual[place], member))
    );
  }
  if (typeof wanted !== 'object' || wanted === null) return actual === wanted;
  if (typeof actual !== 'object' || actual === null || Array.isArray(actual)) return false;
  const given = actual as Record<string, unknown>;
  const names = Object.keys(wanted);
  return (
    names.every((name) => name in given && agrees(given[name], (wanted as Record<string, unknown>)[name])) &&
    (REST in wanted || Object.keys(given).length === names.length)
  );
}
