/** Every reference vector that the core reaches, one test each, with its source in the title. */
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { checkFile, checkVector } from '../../jobs/reference/checkFile.ts';
import { readReferenceFile } from '../../jobs/reference/vectorFile.ts';

const folder = new URL('.', import.meta.url);
const contentOf = (name: string): unknown => JSON.parse(readFileSync(new URL(name, folder), 'utf8'));
const names = readdirSync(folder).filter((name) => name.endsWith('.json'));

const wrongOf = (checked: ReturnType<typeof checkVector>) =>
  checked.outcome === 'wrong' ? checked.mismatches : [];

describe.each(names)('%s', (name) => {
  const content = contentOf(name);
  const reference = readReferenceFile(content);

  if (reference.kind === 'vectors')
    test.each(reference.file.vectors)('$id, $topic ($source)', (vector) => {
      expect(wrongOf(checkVector(vector))).toEqual([]);
    });
  else {
    const checked = new Map(checkFile(content).map((each) => [each.id, each]));
    const members =
      reference.kind === 'quality book'
        ? reference.file.firms.map(({ firm, expected }) => ({ member: String(firm), expected }))
        : reference.file.borrowers.map(({ borrower, expected }) => ({ member: String(borrower), expected }));
    test.each(members.filter(({ expected }) => expected))(
      `$member (${reference.file.basis})`,
      ({ member }) => {
        const result = checked.get(member);
        expect(result?.outcome === 'wrong' ? result.mismatches : result?.outcome).toBe('right');
      },
    );
  }
});

describe('the comparison', () => {
  const vector = {
    id: 'own',
    topic: 'annualise',
    inputs: { value: 7.2, months: 9 },
    expected: { annualised: 9.6 },
    tolerance: 1e-6,
    source: '7.2 x 12 / 9 by hand',
  };

  test('takes a number within tolerance x max(1, |expected|) and no other', () => {
    const at = (annualised: number) => checkVector({ ...vector, expected: { annualised } }).outcome;
    expect(at(9.6 + 9.59e-6)).toBe('right');
    expect(at(9.6 + 9.61e-6)).toBe('wrong');
  });

  test('counts an unknown topic, an unknown key, a wrong null and inputs that cannot be read as wrong', () => {
    const wrongs = [
      { ...vector, topic: 'no such topic' },
      { ...vector, expected: { annualised: 9.6, twice: 19.2 } },
      { ...vector, expected: { annualised: null } },
      { ...vector, inputs: { value: 'seven', months: 9 } },
      { ...vector, inputs: { ...vector.inputs, unheard_of: 1 } },
    ];
    expect(wrongs.map((each) => checkVector(each).outcome)).toEqual(wrongs.map(() => 'wrong'));
  });

  test('refuses a file that is none of the known kinds', () => {
    expect(() => checkFile({ rows: [] })).toThrow();
  });
});
