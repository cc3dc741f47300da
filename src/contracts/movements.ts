/** Why a result stands otherwise than the night before, as it is printed. */
export interface MovementRow {
  readonly key: string;
  /** "Net leverage", "Reporting quality", "Alert: thin headroom, net leverage" */
  readonly what: string;
  readonly before: string;
  readonly after: string;
  readonly steps: readonly { readonly cause: string; readonly from: string; readonly to: string }[];
}

export interface MovementsView {
  /** The night that the result is held against. */
  readonly since: string;
  readonly rows: readonly MovementRow[];
}
