/** The three kinds of reference file, as their format page writes them. */
import { z } from 'zod';

const vector = z.object({
  id: z.string(),
  topic: z.string(),
  inputs: z.unknown(),
  expected: z.record(z.string(), z.unknown()),
  tolerance: z.number(),
  source: z.string(),
});

const vectorFile = z.object({ title: z.string(), vectors: z.array(vector) });

const book = z.object({
  title: z.string(),
  tolerance: z.number(),
  basis: z.string(),
});
const qualityBookFile = book.extend({
  firms: z.array(z.looseObject({ firm: z.number(), expected: z.record(z.string(), z.unknown()).optional() })),
});
const patternBookFile = book.extend({
  borrowers: z.array(
    z.looseObject({
      borrower: z.union([z.number(), z.string()]),
      expected: z.record(z.string(), z.unknown()).optional(),
    }),
  ),
});

export type Vector = z.infer<typeof vector>;
export type ReferenceFile =
  | { readonly kind: 'vectors'; readonly file: z.infer<typeof vectorFile> }
  | { readonly kind: 'quality book'; readonly file: z.infer<typeof qualityBookFile> }
  | { readonly kind: 'pattern book'; readonly file: z.infer<typeof patternBookFile> };

/** Reads a file's content; throws a ZodError that names the place where it is none of the three. */
export function readReferenceFile(content: unknown): ReferenceFile {
  if (typeof content === 'object' && content !== null) {
    if ('firms' in content) return { kind: 'quality book', file: qualityBookFile.parse(content) };
    if ('borrowers' in content) return { kind: 'pattern book', file: patternBookFile.parse(content) };
  }
  return { kind: 'vectors', file: vectorFile.parse(content) };
}
