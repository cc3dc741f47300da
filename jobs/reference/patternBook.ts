/** Ranks a whole book of headroom series together, as the file of the reference book writes them. */
import { z } from 'zod';
import { rankNearLine } from '#core/patterns/nearLineRanking.ts';

const book = z.object({
  borrowers: z.array(
    z.object({ borrower: z.union([z.number(), z.string()]), headroom: z.array(z.number()) }),
  ),
});

/** What the core says of every borrower of a book, in the words of the file: one peer group, its gate taken as open. */
export function patternBook(content: unknown): ReadonlyMap<number | string, Record<string, unknown>> {
  const { series } = rankNearLine(
    book.parse(content).borrowers.map(({ borrower, headroom }) => ({
      id: borrower,
      sector: 'the whole book',
      headrooms: headroom,
    })),
  );
  return new Map(
    series.map((each) => [
      each.id,
      {
        near: each.near,
        passing: each.passing,
        share: each.share,
        expected_passing: each.expectedPassing,
        p: each.pAtLeast,
        local_fdr: each.localFdr,
        listed: each.listed,
      },
    ]),
  );
}
