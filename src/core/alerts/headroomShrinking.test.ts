import { describe, expect, test } from 'vitest';
import { nightOf } from '../example.fixture.ts';
import { decimal } from '../money/decimal.ts';
import type { ProjectedTest, TestToCome } from '../outlook/projection.ts';
import { headroomShrinking } from './headroomShrinking.ts';

const coming = (given: Partial<ProjectedTest> = {}, quarters: 1 | 2 = 1): TestToCome => ({
  testDate: quarters === 1 ? '2026-12-31' : '2027-03-31',
  quarters,
  kind: 'projected',
  level: decimal('3.25'),
  word: 'likely',
  notMet: 24,
  share: 24 / 34,
  n: 34,
  borrowers: 9,
  peers: 'book',
  check: 0.41,
  openAt: 3,
  ...given,
});

const found = (
  tests: readonly TestToCome[],
  millions = { ebitda: 13, debt: 47, cash: 5 },
  given: Parameters<typeof nightOf>[1] = {},
) =>
  headroomShrinking({
    ...nightOf(millions, given),
    projections: [{ covenantId: 1, fromTestDate: '2026-09-30', reason: null, tests }],
  });

describe('headroom shrinking', () => {
  test('is raised soon, with how often, of how many, and at which result it would be open', () => {
    expect(found([coming({ word: 'open', share: 0.66 }), coming({}, 2)])).toMatchObject([
      {
        kind: 'headroom shrinking',
        severity: 'soon',
        covenantId: 1,
        factDate: '2026-09-30',
        sentence:
          'Net leverage 3.23x, at most 3.50x. Likely not met on 31 Mar 2027 (at most 3.25x): so in 71\u00a0% of 34 peer changes over 2 quarters.',
        wouldChange: 'EBITDA of 14 instead of 13 (1 more), a result of 3.00x: the coming test would be open.',
      },
    ]);
  });

  test('needs the word likely: open, too few peers and a holiday raise nothing', () => {
    expect(found([coming({ word: 'open', share: 0.66 })])).toEqual([]);
    expect(
      found([{ testDate: '2026-12-31', quarters: 1, kind: 'too few peers', level: decimal(3) }]),
    ).toEqual([]);
    expect(
      found([
        { testDate: '2026-12-31', quarters: 1, kind: 'nothing to project', reason: 'covenant holiday' },
      ]),
    ).toEqual([]);
  });

  test('is not raised on a test that is not met: that has its own alert', () => {
    expect(found([coming()], { ebitda: 12, debt: 51, cash: 6 })).toEqual([]);
  });

  test('on our own trigger is a note', () => {
    expect(found([coming()], { ebitda: 13, debt: 47, cash: 5 }, { isOurs: true })).toMatchObject([
      {
        severity: 'note',
        sentence: expect.stringContaining('Likely above our trigger on 31 Dec 2026') as unknown,
      },
    ]);
  });

  test('says so where no result of the borrower would change it', () => {
    expect(found([coming({ openAt: null })])[0]?.wouldChange).toContain('No result');
  });
});
