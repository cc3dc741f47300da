/**
 * Every topic that a number links to, with the accessible name of the link. A topic is a line here and a page
 * of that name in src/content/methods; a test compares them. The order is that of the list of methods within a group.
 */
export const METHOD_TOPICS = {
  'twelve-months': 'How twelve months are read',
  headroom: 'How headroom is computed',
  'cures-and-waivers': 'How cures, waivers and resets are read',
  'counterfactual-tests': 'How a test is computed on other earnings',
  'just-passing-patterns': 'How tests near the limit are read',
  'book-pattern': 'How the book’s own test is made',
  'leading-digits': 'How leading digits are tested',
  'why-it-moved': 'How a change is split into its causes',
} as const;

export type MethodTopic = keyof typeof METHOD_TOPICS;

export const METHOD_TOPIC_NAMES = Object.keys(METHOD_TOPICS) as readonly MethodTopic[];
