/** The page drawn from a sheet that the builder made: it stands here because components know no builder. */
import { renderToStaticMarkup } from 'react-dom/server';
import { expect, test } from 'vitest';
import { ReviewSheetPage } from '../../../components/reviews/ReviewSheetPage.tsx';
import { REVIEW_SECTIONS } from '../../../contracts/reviewSheet.ts';
import { CAUTIONS } from '../../../core/cautions.ts';
import { buildMaterial, buildSignal } from './material.fixture.ts';
import { reviewSheet } from './reviewSheet.ts';

const sheet = reviewSheet(buildMaterial({ signals: [buildSignal()] }));
const page = renderToStaticMarkup(<ReviewSheetPage sheet={sheet} />);
const plain = page
  .replaceAll(/<[^>]+>/g, '')
  .replaceAll('&#x27;', "'")
  .replaceAll('&amp;', '&');

test('every section stands in order under its number', () => {
  const places = REVIEW_SECTIONS.map((title, place) => plain.indexOf(`${place + 1} ${title}`));
  expect(places).not.toContain(-1);
  expect(places).toEqual(places.toSorted((one, other) => one - other));
});

test.each(CAUTIONS)('the caution stands on the page: %s', (caution) => {
  expect(plain).toContain(caution);
});

test('it says DRAFT, dates its figures and leads to the export', () => {
  expect(plain).toContain('DRAFT');
  expect(plain).toContain('data cut-off 16 Mar 2026, 01:30 UTC, method 1.0, policy 1, input version 3');
  expect(page).toContain('href="/api/v1/borrowers/7/review-sheet"');
});

test('a result prints on its side of the level, with the strip and the cell it came from', () => {
  expect(plain).toContain('3.5004x');
  expect(page).toContain('class="strip"');
  expect(page).toMatch(
    /href="\/statements\/\d+\/cells\/net_income">&#x27;P&amp;L &#x27;&#x27;25&#x27;!D3<\/a>/,
  );
});

test('a name is text on the page and never markup', () => {
  const hostile = reviewSheet(buildMaterial({ view: { name: '<script>1</script>', isListed: true } }));
  const markup = renderToStaticMarkup(<ReviewSheetPage sheet={hostile} />);
  expect(markup).not.toContain('<script>');
  expect(markup).toContain('Private side');
});
