/** The figures as tables for a terminal. */
import { HONEST_KINDS, type Flags, type Spread, type ValidationFigures } from '#contracts/validation.ts';

const three = (value: number | null): string => (value === null ? '-' : value.toFixed(3).replace(/^0/, ''));
const percent = (value: number): string => `${(100 * value).toFixed(1)}%`;

export function report(figures: ValidationFigures): string {
  return [
    ...areaLines(figures),
    '',
    ...flagLines(figures),
    '',
    ...headroomLines(figures),
    '',
    figures.caution,
    '',
    ...boundLines(figures),
    lastLine(figures),
  ].join('\n');
}

const row = (name: string, cells: readonly string[], width = 9): string =>
  name.padEnd(54) + cells.map((cell) => cell.padStart(width)).join('');

const spreadCells = ({ mean, deviation, least, most }: Spread): string[] =>
  [mean, deviation, least, most].map(three);

function areaLines({ statementBooks: books, seeds }: ValidationFigures): string[] {
  return [
    `Books of statements: ${books.firms} firms, ${books.lifters} of them lifting, ${books.quarters} quarters, seeds ${seeds.from} to ${seeds.to}; by the product's path from statements`,
    row('Area under the curve', ['mean', 'sd', 'least', 'most', 'size', 'power', 'false']),
    ...[books.score, books.headline, ...books.measures].map(({ name, area, worstTenth }) =>
      row(`  ${name}`, [
        ...spreadCells(area),
        ...[worstTenth.size, worstTenth.power, worstTenth.falseShare].map(percent),
      ]),
    ),
    '  size, power and false share: of the tenth of each book that looks worst',
    row('Blocks of the score alone', []),
    ...books.blocks.map(({ name, area }) => row(`  ${name}`, spreadCells(area))),
    row('The score by channel and by how long it has gone on', []),
    ...[...books.byChannel, ...books.byQuartersIn].map(({ name, area }) =>
      row(`  ${name}`, spreadCells(area)),
    ),
    `Honest firms move ${books.quarterlyMove.score.toFixed(1)} points a quarter by score, ${books.quarterlyMove.headline.toFixed(1)} by headline; without score: ${percent(books.withoutScore)}`,
  ];
}

function flagLines({ statementBooks: books }: ValidationFigures): string[] {
  const tests: readonly Flags[] = [
    ...books.lines,
    ...[books.score, ...books.measures.slice(0, 5)].map(({ name, worstTenth }) => ({
      ...worstTenth,
      test: `${name}, worst tenth`,
    })),
  ];
  return [
    row('Marked by', ['size', 'power', 'false', ...HONEST_KINDS], 13),
    ...tests.map(({ test, size, power, falseShare, falseAlarms }) =>
      row(
        `  ${test}`,
        [size, power, falseShare, ...HONEST_KINDS.map((kind) => falseAlarms[kind])].map(percent),
        13,
      ),
    ),
    '  size and the four kinds: honest firms that are marked; power: lifting firms that are; false: honest among those marked',
  ];
}

function headroomLines({ headroomBooks: books }: ValidationFigures): string[] {
  return [
    `Books of covenant tests: ${books.borrowers} borrowers, a fifth of them lifting where there is any`,
    `  headroom tests lifting seekers books | gate  list listed false pooled never power twice+ area | count: area power false`,
    ...books.cells.map((cell) =>
      [
        `  ${cell.headroom.padEnd(8)} ${String(cell.tests).padStart(5)} ${cell.lifting.toFixed(1).padStart(7)} ${cell.cushionSeekers.toFixed(1).padStart(7)} ${String(cell.books).padStart(5)} |`,
        three(cell.gateOpen).padStart(5),
        three(cell.withList).padStart(5),
        cell.listedPerBook.toFixed(1).padStart(6),
        three(cell.falseShare).padStart(5),
        three(cell.falseShareOfListed).padStart(6),
        three(cell.neverLiftedOfListed).padStart(5),
        three(cell.power).padStart(5),
        three(cell.powerRepeated).padStart(6),
        three(cell.area).padStart(5),
        '|',
        three(cell.count.area).padStart(11),
        three(cell.count.power).padStart(5),
        three(cell.count.falseShareOfListed).padStart(5),
      ].join(' '),
    ),
    ...books.totals.map(
      ({ kind, books: count, withList, falseShare, falseShareOfListed, neverLiftedOfListed }) =>
        `  all ${count} books ${kind}: list in ${percent(withList)}, false share ${three(falseShare)}, of all listed ${three(falseShareOfListed)}, never lifted ${three(neverLiftedOfListed)}`,
    ),
    '  false: honest among the listed, mean over books, nought without a list; pooled: the same of all listed; never: listed without one lifted test',
  ];
}

const boundLines = ({ bounds }: ValidationFigures): string[] =>
  bounds.length === 0
    ? ['The bounds are not judged on fewer than 30 seeds.']
    : bounds.map(
        ({ what, bound, reached, holds }) =>
          `${holds ? 'holds' : 'FAILS'}: ${what}: ${three(reached)} (bound ${three(bound)})`,
      );

function lastLine({ statementBooks, headroomBooks }: ValidationFigures): string {
  const { score, measures } = statementBooks;
  const lists = headroomBooks.totals.map(({ kind, withList }) => `${kind} ${percent(withList)}`);
  return `area ${three(score.area.mean)}, best single measure ${three(measures[0]!.area.mean)} (${measures[0]!.name}); books with a list: ${lists.join(', ')}`;
}
