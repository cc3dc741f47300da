/** What a page shows again after a form was refused: the text typed and the fault, by field. */
export interface ShownAnswer {
  readonly detail: string;
  readonly errors: readonly { readonly field: string; readonly message: string }[];
  readonly typed: Readonly<Record<string, string>>;
}

export const errorOf = (answer: ShownAnswer | null, field: string): string | undefined =>
  answer?.errors.find((error) => error.field === field)?.message;

export const typedIn = (answer: ShownAnswer | null, field: string): string => answer?.typed[field] ?? '';
