/** Cell names of a sheet's grid: 'B12' is row 11, column 1 of the arrays. */
export function columnName(index: number): string {
  let name = '';
  for (let rest = index + 1; rest > 0; rest = Math.floor((rest - 1) / 26))
    name = String.fromCharCode(65 + ((rest - 1) % 26)) + name;
  return name;
}

export const cellName = (row: number, column: number): string => `${columnName(column)}${row + 1}`;
