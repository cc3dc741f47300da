/** Rows of a run that would count twice: parts of a total that is taken, totals of rows that are taken one by one. */
import { decimal } from '#core/money/decimal.ts';
import { isStandardLine, isSubtotal } from './lineNature.ts';
import { isOverheads } from './provenTotals.ts';
import type { Run } from './statements.ts';
import type { Line } from './wordings/lines.ts';

/** Rows that would count twice, with the reason. */
export function droppedRows(run: Run): Map<number, string> {
  const dropped = new Map<number, string>();
  const { sums, contradicted } = run.signed.sums;
  run.rows.forEach((read, index) => {
    if (read.ofWhich) dropped.set(index, 'already in the row above');
    if (contradicted.has(index))
      dropped.set(index, 'does not agree with its parts, which the wider total proves');
  });
  for (const [index, parts] of [...sums, ...totalsAbove(run)]) dropForSum(run, index, parts, dropped);
  dropRepeatedTotals(run, dropped);
  return dropped;
}

function dropForSum(run: Run, index: number, parts: readonly number[], dropped: Map<number, string>): void {
  const line = isOverheads(run, index) ? 'sga' : (run.rows[index]?.line ?? null);
  if (!isStandardLine(line) || isSubtotal(line)) return;
  const others = parts.filter(
    (part) => isStandardLine(run.rows[part]?.line ?? null) && run.rows[part]?.line !== line,
  );
  if (others.length > 0) dropped.set(index, 'a total of the rows that are placed one by one');
  else for (const part of parts) dropped.set(part, `in the total '${run.rows[index]?.row.label ?? ''}'`);
}

/** A total that stands above its parts, which are set in below it. */
function totalsAbove(run: Run): Map<number, number[]> {
  const found = new Map<number, number[]>();
  run.rows.forEach((read, index) => {
    if (!read.hasAmounts || isSubtotal(read.line)) return;
    const parts: number[] = [];
    for (let at = index + 1; at < run.rows.length; at += 1) {
      const below = run.rows[at];
      if (!below?.hasAmounts || below.row.indent <= read.row.indent) break;
      parts.push(at);
    }
    if (parts.length >= 2 && addUp(run, index, parts)) found.set(index, parts);
  });
  return found;
}

function addUp(run: Run, index: number, parts: readonly number[]): boolean {
  const tolerance = run.step.times(parts.length + 1).div(2);
  const wanted = run.amounts[index] ?? [];
  if (wanted.every((amount) => amount === null || amount.isZero())) return false;
  return wanted.every((amount, column) => {
    if (amount === null) return true;
    const sum = parts.reduce((total, part) => total.plus(run.amounts[part]?.[column] ?? 0), decimal(0));
    return sum.minus(amount).abs().lte(tolerance);
  });
}

/** The same total twice: the first, or the wider one where the second holds the first. */
function dropRepeatedTotals(run: Run, dropped: Map<number, string>): void {
  const first = new Map<Line, number>();
  run.rows.forEach((read, index) => {
    if (!read.line || !isSubtotal(read.line) || !read.hasAmounts || dropped.has(index)) return;
    const before = first.get(read.line);
    if (before === undefined) {
      first.set(read.line, index);
      return;
    }
    const holdsFirst = run.signed.sums.sums.get(index)?.includes(before) === true;
    dropped.set(holdsFirst ? before : index, 'the same total stands twice');
    if (holdsFirst) first.set(read.line, index);
  });
}
