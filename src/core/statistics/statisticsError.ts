/** Why a statistic cannot be given. The caller says what that means for its own figure. */
export type StatisticsError =
  | { readonly kind: 'too-few-points'; readonly needed: number; readonly given: number }
  | { readonly kind: 'rank-deficient'; readonly rank: number; readonly columns: number }
  | { readonly kind: 'no-spread' }
  | { readonly kind: 'no-convergence'; readonly steps: number };
