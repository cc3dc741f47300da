/** What is written in Markdown beside the program: the pages of the methods. */
import { defineCollection, z } from 'astro:content';
import { glob } from 'astro/loaders';
import { methodPage } from './contracts/methods.ts';

/** The contract is written once, for the build and for the tests; the build's own schema only passes on what it says. */
const frontMatter = z.unknown().transform((front, context) => {
  const read = methodPage.safeParse(front);
  if (read.success) return read.data;
  for (const { path, message } of read.error.issues)
    context.addIssue({ code: 'custom', path: path.map(String), message });
  return z.NEVER;
});

export const collections = {
  methods: defineCollection({
    loader: glob({ pattern: '*.md', base: './src/content/methods' }),
    schema: frontMatter,
  }),
};
