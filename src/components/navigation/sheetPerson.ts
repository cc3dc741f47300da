/** Who is signed in, as the top bar prints it: role and desk names in words. */
export interface SheetPerson {
  readonly name: string;
  readonly roles: readonly string[];
  readonly desks: readonly string[];
}
