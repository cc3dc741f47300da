/** Works out a formula of sums and products over named cells, where a file holds no stored value for it. */
import { decimal, ZERO, type Decimal } from '#core/money/decimal.ts';
import { columnNumber } from './cells.ts';

/** The value of a cell, zero for a blank one; undefined where it cannot be known. */
export type CellValue = (sheet: string, row: number, column: number) => Decimal | undefined;

const TOKEN =
  /\s*(?:('(?:[^']|'')+'|[A-Za-z_][\w.]*)!)?(\$?[A-Z]{1,3}\$?\d+(?::\$?[A-Z]{1,3}\$?\d+)?)(?![\w(])|\s*(\d+(?:\.\d+)?)|\s*(SUM|ROUND)\s*(?=\()|\s*([-+*/(),])/iy;
const MAX_CELLS_OF_RANGE = 5_000;

type Token =
  | { readonly kind: 'cells'; readonly sheet: string; readonly range: string }
  | { readonly kind: 'number'; readonly value: Decimal }
  | { readonly kind: 'function'; readonly name: string }
  | { readonly kind: 'mark'; readonly mark: string };

/** Undefined where the formula uses anything but + - * / SUM ROUND, numbers and cells of this file. */
export function workOut(formula: string, ownSheet: string, valueOf: CellValue): Decimal | undefined {
  const tokens = tokensOf(formula, ownSheet);
  if (!tokens) return undefined;
  const parser = new FormulaParser(tokens, valueOf);
  const value = parser.sum();
  return parser.atEnd ? value : undefined;
}

function tokensOf(formula: string, ownSheet: string): Token[] | null {
  const text = formula.replace(/^=/, '').trimEnd();
  const tokens: Token[] = [];
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < text.length) {
    const match = TOKEN.exec(text);
    if (!match) return null;
    const [, sheet, range, number, name, mark] = match;
    if (range !== undefined) {
      const named = sheet?.replace(/^'|'$/g, '').replace(/''/g, "'");
      tokens.push({ kind: 'cells', sheet: named ?? ownSheet, range });
    } else if (number !== undefined) tokens.push({ kind: 'number', value: decimal(number) });
    else if (name !== undefined) tokens.push({ kind: 'function', name: name.toUpperCase() });
    else if (mark !== undefined) tokens.push({ kind: 'mark', mark });
  }
  return tokens;
}

class FormulaParser {
  private at = 0;
  private readonly tokens: readonly Token[];
  private readonly valueOf: CellValue;

  constructor(tokens: readonly Token[], valueOf: CellValue) {
    this.tokens = tokens;
    this.valueOf = valueOf;
  }

  get atEnd(): boolean {
    return this.at === this.tokens.length;
  }

  sum(): Decimal | undefined {
    let value = this.product();
    for (let mark = this.take('+', '-'); mark; mark = this.take('+', '-')) {
      const next = this.product();
      if (!value || !next) return undefined;
      value = mark === '+' ? value.plus(next) : value.minus(next);
    }
    return value;
  }

  private product(): Decimal | undefined {
    let value = this.factor();
    for (let mark = this.take('*', '/'); mark; mark = this.take('*', '/')) {
      const next = this.factor();
      if (!value || !next || (mark === '/' && next.isZero())) return undefined;
      value = mark === '*' ? value.times(next) : value.div(next);
    }
    return value;
  }

  private factor(): Decimal | undefined {
    if (this.take('-')) return this.factor()?.neg();
    if (this.take('+')) return this.factor();
    if (this.take('(')) {
      const value = this.sum();
      return this.take(')') ? value : undefined;
    }
    const token = this.tokens[this.at];
    if (!token || token.kind === 'mark') return undefined;
    this.at += 1;
    if (token.kind === 'number') return token.value;
    if (token.kind === 'function') return this.call(token.name);
    const cells = cellsOf(token.range);
    const [only] = cells;
    return cells.length === 1 && only ? this.valueOf(token.sheet, only.row, only.column) : undefined;
  }

  private call(name: string): Decimal | undefined {
    if (!this.take('(')) return undefined;
    if (name === 'ROUND') {
      const value = this.sum();
      const places = this.take(',') ? this.sum() : undefined;
      if (!this.take(')') || !value || !places) return undefined;
      const unit = decimal(10).pow(places);
      return value.times(unit).round().div(unit);
    }
    let total: Decimal | undefined = ZERO;
    do {
      const next: Decimal | undefined = this.rangeOrValue();
      total = total && next ? total.plus(next) : undefined;
    } while (this.take(','));
    return this.take(')') ? total : undefined;
  }

  private rangeOrValue(): Decimal | undefined {
    const token = this.tokens[this.at];
    if (token?.kind !== 'cells' || !token.range.includes(':')) return this.sum();
    this.at += 1;
    const cells = cellsOf(token.range);
    if (cells.length > MAX_CELLS_OF_RANGE) return undefined;
    return cells.reduce<Decimal | undefined>((total, { row, column }) => {
      const value = this.valueOf(token.sheet, row, column);
      return total && value ? total.plus(value) : undefined;
    }, ZERO);
  }

  private take(...marks: string[]): string | null {
    const token = this.tokens[this.at];
    if (token?.kind !== 'mark' || !marks.includes(token.mark)) return null;
    this.at += 1;
    return token.mark;
  }
}

function cellsOf(range: string): { row: number; column: number }[] {
  const [from = '', to = from] = range.replace(/\$/g, '').split(':');
  const [top, left] = [Number(/\d+/.exec(from)?.[0]), columnNumber(/[A-Z]+/i.exec(from)?.[0] ?? '')];
  const [bottom, right] = [Number(/\d+/.exec(to)?.[0]), columnNumber(/[A-Z]+/i.exec(to)?.[0] ?? '')];
  if ((bottom - top + 1) * (right - left + 1) > MAX_CELLS_OF_RANGE) return [];
  const cells: { row: number; column: number }[] = [];
  for (let row = top; row <= bottom; row += 1) {
    for (let column = left; column <= right; column += 1) cells.push({ row, column });
  }
  return cells;
}
