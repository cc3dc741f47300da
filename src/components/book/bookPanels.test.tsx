/** What the page of the book prints, in every state: cautions, refusals, and nothing stronger than "pattern". */
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, test } from 'vitest';
import type { BookView } from '../../contracts/book.ts';
import { POPULATION_NOT_BORROWER } from '../../core/cautions.ts';
import { bookParts } from '../../core/patterns/bookParts.ts';
import { bookStanding } from '../../core/patterns/bookStanding.ts';
import { buildBook, buildEvenBook } from '../../core/patterns/headroomBook.fixture.ts';
import type { HeadroomRow } from '../../core/patterns/headroomRow.ts';
import { patternStanding } from '../../core/patterns/patternStanding.ts';
import {
  BOOK_SENTENCE,
  LEVERAGE_SENTENCE,
  LOW_POWER_SENTENCE,
  NO_PATTERN_SENTENCE,
} from '../../core/patterns/patternWording.ts';
import { statementDigits } from '../../core/patterns/statementDigits.ts';
import { BookPanels } from './BookPanels.tsx';
import type { BookLook } from './bookView.ts';

const LOOK: BookLook = { query: {}, width: '2' };

function viewOf(rows: readonly HeadroomRow[], given: Partial<BookView> = {}): BookView {
  const parts = bookParts(rows, 1);
  const { published, measures, sectors, ...standing } = bookStanding(
    patternStanding(rows),
    statementDigits([]),
    parts,
  );
  return {
    asOf: '2026-11-30',
    dataCutOff: '2026-12-01T01:30:00.000Z',
    methodVersion: '2.0',
    measures: measures.map((code) => ({ code, name: code })),
    sectors: sectors.map((code) => ({ code, label: code })),
    pattern: parts[0]!.pattern,
    standing,
    listed: published.map(({ covenantId, borrowerId, ...each }) => ({
      ...each,
      covenantId,
      borrowerId,
      covenantName: 'Net leverage',
      borrowerName: `Borrower ${borrowerId}`,
    })),
    listedElsewhere: null,
    readsAll: false,
    ...given,
  };
}

const textOf = (markup: string): string =>
  markup
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll('&#x27;', "'")
    .replaceAll('&quot;', '"')
    .replaceAll('&amp;', '&')
    .replaceAll(/\s+/g, ' ');
const printed = (view: BookView, look = LOOK): string =>
  textOf(renderToStaticMarkup(<BookPanels look={look} book={view} />));

const lifted = viewOf(buildBook({ seed: 3, borrowers: 300, quarters: 20, lifters: 0.35, lifting: 0.9 }));
const smooth = viewOf(buildEvenBook(600, { measure: 'interest-cover' }));
const refused = viewOf(buildEvenBook(100));
const views = { lifted, smooth, refused };

describe('a book whose own test rejects', () => {
  const text = printed(lifted);

  test('says what is seen and no more, with the sentence that belongs to leverage', () => {
    expect(text).toContain(BOOK_SENTENCE);
    expect(text).toContain(LEVERAGE_SENTENCE);
    expect(text).not.toContain(LOW_POWER_SENTENCE);
  });

  test('lists borrowers, linked, with the count of other desks only from five on', () => {
    const markup = renderToStaticMarkup(<BookPanels look={LOOK} book={lifted} />);
    const [first] = lifted.listed;
    expect(markup).toContain(`/borrowers/${first?.borrowerId}?covenant=${first?.covenantId}`);
    expect(text).toContain('On borrowers of other desks: fewer than 5.');
    expect(printed({ ...lifted, listedElsewhere: 5 })).toContain('On borrowers of other desks: 5.');
    expect(printed({ ...lifted, readsAll: true })).not.toContain('other desks');
  });

  test('says so where none of them is on one’s own desks', () => {
    expect(printed({ ...lifted, listed: [] })).toContain('No covenant of your desks is on the list');
  });
});

describe('a book whose own test does not reject', () => {
  const text = printed(smooth);

  test('says that this is no evidence of none, and that power is low below 1,000 tests', () => {
    expect(text).toContain(NO_PATTERN_SENTENCE);
    expect(text).toContain(LOW_POWER_SENTENCE);
    expect(text).not.toContain(BOOK_SENTENCE);
  });

  test('lists nobody and says why', () => {
    expect(text).toContain('so no borrower is listed');
  });

  test('says that no agreement rounds instead of showing Frandsen’s test', () => {
    expect(text).toContain('not shown: no agreement here rounds its ratio');
  });
});

describe('refusals', () => {
  test('say how many tests there are and how many are needed', () => {
    expect(printed(refused)).toContain(
      'Refused: 34 tests within 10\u00a0% of the limit, 100 are needed.'.replaceAll(/\s/g, ' '),
    );
  });

  test('say no count below five', () => {
    const few = viewOf(buildEvenBook(40).filter(({ headroom }) => Math.abs(headroom!) > 0.09));
    expect(few.pattern).toMatchObject({ ok: false, error: { given: expect.any(Number) as number } });
    expect(printed(few)).toMatch(/Refused: fewer than 5 tests within 10/);
    const single = viewOf(buildEvenBook(900).map((row) => ({ ...row, borrowerId: 1 })));
    expect(printed(single)).toContain('Refused: fewer than 5 borrowers.');
    expect(printed({ ...single, pattern: null })).toContain('No test of the book belongs to this part.');
  });
});

test.each(Object.entries(views))('%s: the caution stands, and nothing stronger than a pattern', (_, view) => {
  const text = printed(view);
  expect(text).toContain(POPULATION_NOT_BORROWER);
  const said = text.replaceAll(POPULATION_NOT_BORROWER, '');
  expect(said).not.toMatch(
    /manipulat|managed|misconduct|fraud|suspicio|deliberate|intent|cheat|breach|default|lifted|guilty|proof|prove/i,
  );
});

test.each(['1', '2', '3'] as const)('the chart at %s % has its figures as a table', (width) => {
  const text = printed(lifted, { ...LOOK, width });
  expect(text).toContain(`intervals of ${width} %`);
  const pattern = lifted.pattern?.ok ? lifted.pattern.value : null;
  const histogram = pattern?.histograms.find((each) => each.width === Number(width) / 100);
  expect(text).toContain(`0 % to ${width} % passing ${histogram?.counts[30 / Number(width)]}`);
});
