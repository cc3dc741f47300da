import type { BookView } from '../../contracts/book.ts';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import type { BookPattern } from '../../core/patterns/bookPattern.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { AroundTheLimit } from './AroundTheLimit.tsx';
import { BookSplits } from './BookSplits.tsx';
import { bookSearch, type BookLook } from './bookView.ts';
import { countText, refusalText } from './bookWords.ts';
import { FurtherTests } from './FurtherTests.tsx';
import { HeadroomHistogram } from './HeadroomHistogram.tsx';
import { LeadingDigits } from './LeadingDigits.tsx';
import { PatternList } from './PatternList.tsx';

interface BookPanelsProps {
  readonly look: BookLook;
  readonly book: BookView;
}

/** The part that is looked at, then what is said of the whole book. */
export function BookPanels({ look, book }: BookPanelsProps) {
  const nameOfMeasure = (code: string) => book.measures.find((each) => each.code === code)?.name ?? code;
  const nameOfSector = (code: string) => book.sectors.find((each) => each.code === code)?.label ?? code;
  const { pattern } = book;
  return (
    <div className="stack">
      {pattern?.ok ? (
        <>
          <div className="with-evidence">
            <div className="stack">
              <Landings look={look} pattern={pattern.value} />
              <FurtherTests pattern={pattern.value} />
            </div>
            <AroundTheLimit pattern={pattern.value} />
          </div>
          <BookSplits
            pattern={pattern.value}
            nameOfMeasure={nameOfMeasure}
            nameOfSector={nameOfSector}
            measureHref={look.query.measure ? null : (code) => hrefWith(look, { measure: code })}
            sectorHref={look.query.sector ? null : (code) => hrefWith(look, { sector: code })}
          />
        </>
      ) : (
        <Panel title="Where test results land">
          <p>
            {pattern ? refusalText(pattern.error) : 'No test of the book belongs to this part.'} Take a filter
            away, or wait for more tests.
          </p>
        </Panel>
      )}
      <PatternList book={book} nameOfMeasure={nameOfMeasure} />
      <LeadingDigits digits={book.standing.digits} />
    </div>
  );
}

/** The address is read again by the server, which knows its codes. */
const hrefWith = (
  { query, width }: BookLook,
  part: { readonly measure?: string; readonly sector?: string },
): string => {
  const search = new URLSearchParams(bookSearch({ query, width }));
  for (const [key, value] of Object.entries(part)) search.set(key, value);
  return `/book?${search.toString()}`;
};

function Landings({ look, pattern }: { readonly look: BookLook; readonly pattern: BookPattern }) {
  const width = Number(look.width) / 100;
  const histogram = pattern.histograms.find((each) => each.width === width);
  const sides = [pattern.headline, ...pattern.otherWidths].find((each) => each.width === width);
  if (!histogram || !sides) return null;
  return (
    <Panel title="Where test results land" aside={<MethodLink topic="book-pattern" />}>
      <p className="type-second mb-2">
        {countText(pattern.n)} tests of {countText(pattern.borrowers)} borrowers,{' '}
        {formatDay(plainDate(pattern.from))} to {formatDay(plainDate(pattern.until))};{' '}
        {countText(pattern.nearLimit)} within 10{'\u00a0'}% of the limit.
      </p>
      <HeadroomHistogram histogram={histogram} sides={sides} />
    </Panel>
  );
}
