/**
 * QR factors of a tall matrix by Householder reflections with column pivoting (Golub & Van Loan, Matrix
 * Computations, section 5.4; from memory).
 *
 * Columns are first brought to about unit length by powers of two, which is exact, so that the rank does not depend
 * on the units a regressor is measured in.
 */
export interface QrFactors {
  /** R of the pivoted, scaled columns: `upper[j]` is column j, rows 0 to j. */
  readonly upper: readonly Float64Array[];
  /** Q'y. */
  readonly rotated: Float64Array;
  /** `order[j]` is the original place of the j-th pivoted column. */
  readonly order: readonly number[];
  readonly scales: readonly number[];
  readonly rank: number;
}

/** A diagonal of R below this share of the largest one is taken for zero: far above rounding, far below Longley. */
const RANK_TOLERANCE = 1e-11;

/**
 * QR factors of the columns, with the response rotated alongside; `rank` is less than the columns where one says nothing new.
 *
 * @example factorise([[1, 1, 1], [2, 2, 2]], [1, 2, 3]).rank // => 1
 */
export function factorise(columns: readonly (readonly number[])[], response: readonly number[]): QrFactors {
  const scales = columns.map((column) => powerOfTwoNear(lengthOf(column)));
  const work = columns.map((column, k) => Float64Array.from(column, (value) => value / scales[k]!));
  const rotated = Float64Array.from(response);
  const order = columns.map((_, k) => k);
  let rank = 0;
  let largest = 0;
  for (let step = 0; step < work.length; step += 1) {
    bringLongestForward(work, order, step);
    const length = tailLength(work[step]!, step);
    largest = Math.max(largest, length);
    if (length <= RANK_TOLERANCE * largest || length === 0) break;
    reflect(work, rotated, step, length);
    rank += 1;
  }
  return { upper: work, rotated, order, scales, rank };
}

/**
 * Coefficients in the original order and units. The factors must have full rank.
 *
 * @example solveUpper(factorise([[1, 0], [0, 2]], [3, 8])) // => [3, 4]
 */
export function solveUpper({ upper, rotated, order, scales }: QrFactors): number[] {
  const columns = upper.length;
  const solution = new Array<number>(columns).fill(0);
  for (let row = columns - 1; row >= 0; row -= 1) {
    let rest = rotated[row]!;
    for (let k = row + 1; k < columns; k += 1) rest -= upper[k]![row]! * solution[k]!;
    solution[row] = rest / upper[row]![row]!;
  }
  return inOriginalOrder(order, (place) => solution[place]! / scales[order[place]!]!);
}

/**
 * Diagonal of the inverse of X'X, in the original order and units. The factors must have full rank.
 *
 * @example inverseDiagonal(factorise([[1, 0], [0, 2]], [3, 8])) // => [1, 0.25]
 */
export function inverseDiagonal({ upper, order, scales }: QrFactors): number[] {
  const columns = upper.length;
  const squares = new Array<number>(columns).fill(0);
  for (let target = 0; target < columns; target += 1) {
    const inverse = new Array<number>(columns).fill(0);
    for (let row = target; row >= 0; row -= 1) {
      let rest = row === target ? 1 : 0;
      for (let k = row + 1; k <= target; k += 1) rest -= upper[k]![row]! * inverse[k]!;
      const entry = rest / upper[row]![row]!;
      inverse[row] = entry;
      squares[row] = squares[row]! + entry ** 2;
    }
  }
  return inOriginalOrder(order, (place) => squares[place]! / scales[order[place]!]! ** 2);
}

function inOriginalOrder(order: readonly number[], valueAt: (place: number) => number): number[] {
  const result = new Array<number>(order.length).fill(0);
  order.forEach((original, place) => {
    result[original] = valueAt(place);
  });
  return result;
}

/** Euclidean length, through the largest entry so that the squares cannot overflow. */
function lengthOf(column: readonly number[]): number {
  const largest = column.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  if (largest === 0) return 0;
  return largest * Math.sqrt(column.reduce((sum, value) => sum + (value / largest) ** 2, 0));
}

const powerOfTwoNear = (length: number): number => (length > 0 ? 2 ** Math.round(Math.log2(length)) : 1);

function tailLength(column: Float64Array, from: number): number {
  let sum = 0;
  for (let row = from; row < column.length; row += 1) sum += column[row]! ** 2;
  return Math.sqrt(sum);
}

function bringLongestForward(work: Float64Array[], order: number[], step: number): void {
  let best = step;
  let bestLength = -1;
  for (let k = step; k < work.length; k += 1) {
    const length = tailLength(work[k]!, step);
    if (length > bestLength) [best, bestLength] = [k, length];
  }
  [work[step], work[best]] = [work[best]!, work[step]!];
  [order[step], order[best]] = [order[best]!, order[step]!];
}

/** Turns column `step` onto its own axis and every later column and the response with it. */
function reflect(work: Float64Array[], rotated: Float64Array, step: number, length: number): void {
  const pivot = work[step]!;
  const head = pivot[step]!;
  const diagonal = head > 0 ? -length : length;
  const normal = pivot.slice(step);
  normal[0] = head - diagonal;
  const squared = length * (length + Math.abs(head));
  for (const target of [...work.slice(step + 1), rotated]) {
    let product = 0;
    for (let k = 0; k < normal.length; k += 1) product += normal[k]! * target[step + k]!;
    const factor = product / squared;
    for (let k = 0; k < normal.length; k += 1) target[step + k]! -= factor * normal[k]!;
  }
  pivot[step] = diagonal;
  pivot.fill(0, step + 1);
}
