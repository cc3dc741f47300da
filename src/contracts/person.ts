/** A person as the product shows them to others and to themselves. */
export interface PersonRow {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly string[];
  readonly desks: readonly string[];
}
