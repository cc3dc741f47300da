/** The cell of a stored file, shown in its sheet. */
export const cellHref = (
  importId: number,
  { sheet, cell }: { readonly sheet: string; readonly cell: string },
): string => `/imports/${importId}?${new URLSearchParams({ sheet, cell }).toString()}`;
