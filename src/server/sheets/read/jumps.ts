/** Columns out of scale with their neighbours or with what is on file: asked before anything is taken from them. */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import type { Asking } from './asking.ts';
import type { TableFact } from './facts.ts';
import type { ReadingContext } from '#core/statements/workbookReading.ts';

/** A change of more than a hundredfold is no growth. Common practice, no source. */
const JUMP = 100;
const MONTHS_OF_QUARTER = 3;

/** Facts of columns that jump wait for the answer, and are multiplied with the factor that it names. */
export function withoutJumps(
  facts: readonly TableFact[],
  context: ReadingContext,
  asking: Asking,
): TableFact[] {
  const columns = new Map<string, TableFact[]>();
  for (const fact of facts) {
    const key = `${fact.sheet}:${fact.column.key}`;
    columns.set(key, [...(columns.get(key) ?? []), fact]);
  }
  const sizes = new Map([...columns].map(([key, own]) => [key, sizeOf(own)]));
  return [...columns].flatMap(([key, own]) => {
    const size = sizes.get(key);
    if (!size) return own;
    const others = [...sizes].flatMap(([other, candidate]) =>
      other !== key && candidate?.line === size.line && candidate.sheet === size.sheet
        ? [candidate.perMonth]
        : [],
    );
    const compared = median(others) ?? lastRevenue(size, own, context);
    if (!compared || compared.isZero() || !isJump(size.perMonth.div(compared))) return own;
    return answered(`scale-jump:${key}`, own, size, compared, asking);
  });
}

interface Size {
  readonly line: string;
  readonly sheet: string;
  readonly perMonth: Decimal;
  readonly fact: TableFact;
}

/** Revenue by the month, or total assets. */
function sizeOf(facts: readonly TableFact[]): Size | null {
  const fact =
    facts.find(({ code }) => code === 'revenue') ?? facts.find(({ code }) => code === 'total_assets');
  if (!fact || decimal(fact.amount).lte(0)) return null;
  const perMonth = decimal(fact.amount).div(fact.months || 1);
  return { line: fact.code, sheet: fact.sheet, perMonth, fact };
}

const isJump = (ratio: Decimal): boolean => ratio.gte(JUMP) || ratio.lte(decimal(1).div(JUMP));

function median(values: readonly Decimal[]): Decimal | null {
  const sorted = [...values].sort((one, other) => one.comparedTo(other));
  return sorted[Math.floor((sorted.length - 1) / 2)] ?? null;
}

/** Only a unit that the file states can disagree with what is on file; an open one is asked about anyway. */
function lastRevenue(
  size: Size,
  facts: readonly TableFact[],
  { lastQuarterRevenue }: ReadingContext,
): Decimal | null {
  const waits = facts.some(({ waitsFor }) => waitsFor.some((key) => key.startsWith('unit')));
  if (size.line !== 'revenue' || lastQuarterRevenue === null || waits) return null;
  return decimal(lastQuarterRevenue).div(MONTHS_OF_QUARTER);
}

function answered(
  key: string,
  facts: readonly TableFact[],
  size: Size,
  compared: Decimal,
  asking: Asking,
): TableFact[] {
  const ratio = compared.div(size.perMonth);
  const factor = [1000, 1_000_000, 0.001, 0.000001].find(
    (scale) => ratio.div(scale).gte('0.1') && ratio.div(scale).lte(10),
  );
  const options = [
    ...(factor
      ? [
          {
            value: decimal(factor).toFixed(),
            label: factor > 1 ? `Multiply the column by ${factor}` : `Divide the column by ${1 / factor}`,
          },
        ]
      : []),
    { value: '1', label: 'The figures are right as they stand' },
  ];
  const answer = asking.ask({
    key,
    kind: 'scale-jump',
    holdsFor: 'file',
    text: `Column ${size.fact.column.key} on '${size.sheet}' is out of scale: ${size.fact.label} is ${size.fact.rawText}, ${ratio.gt(1) ? `${ratio.toFixed(0)} times less` : `${decimal(1).div(ratio).toFixed(0)} times more`} than elsewhere. In another unit?`,
    where: [{ sheet: size.fact.sheet, cell: size.fact.cell }],
    options,
    accepts: (given) => /^\d+(\.\d+)?$/.test(given) && decimal(given).gt(0),
  });
  return facts.map((fact) =>
    answer === null
      ? { ...fact, waitsFor: [...fact.waitsFor, key] }
      : { ...fact, amount: decimal(fact.amount).times(answer).toFixed() },
  );
}
