/** What the page of a method must say: the front matter of each file in src/content/methods. */
import { METHOD_SETTING_KEYS } from '../core/methodSettings.ts';
import { POLICY_KEYS } from '../core/policySettings.ts';
import { LINE_ITEMS } from '../core/statements/lineItems.ts';
import { METHOD_TOPIC_NAMES } from './methodTopics.ts';
import { z } from './zod.ts';

export const METHOD_GROUPS = [
  'Statements',
  'Covenants',
  'What lies ahead',
  'Reporting quality',
  'Just-passing patterns',
  'Alerts',
  'Dates, policy and versions',
] as const;

const sentences = z.array(z.string().trim().min(1)).min(1);

/** A figure of the page that a test computes: `run` is evaluated with the exports of `module` and of the examples' fixture. */
const example = z.strictObject({
  text: z.string().trim().min(1),
  /** What it comes to, as printed behind the text. Its first number is compared at the digits it has. */
  comesTo: z.string().trim().min(1),
  module: z.string().regex(/^src\/core\/.+\.ts$/),
  run: z.string().trim().min(1),
});

/** Front matter of a method page. */
export const methodPage = z.strictObject({
  title: z.string().trim().min(1),
  group: z.enum(METHOD_GROUPS),
  /** Of the number that links here. */
  unit: z.string().trim().min(1),
  formula: sentences,
  /** Statement lines that go in, by code. */
  lines: z.array(z.enum(LINE_ITEMS.map(({ code }) => code))).default([]),
  /** Other results and facts that go in. */
  inputs: sentences,
  /** Values in force are printed by the page out of the policy and the methods' tables. */
  settings: z.array(z.enum([...POLICY_KEYS, ...METHOD_SETTING_KEYS])).default([]),
  sources: sentences,
  limits: sentences,
  /** Method version since which it is computed so. */
  since: z.string().regex(/^\d+\.\d+$/),
  examples: z.array(example).default([]),
  /** Pages that the reader goes on to. */
  related: z.array(z.enum(METHOD_TOPIC_NAMES)).default([]),
});
export type MethodPage = z.infer<typeof methodPage>;
export type MethodExample = z.infer<typeof example>;
