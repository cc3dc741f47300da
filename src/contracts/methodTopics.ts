/**
 * Every topic that a number links to, with the accessible name of the link. A topic is a line here and a page
 * of that name in src/content/methods; a test compares them. The order is that of the list of methods within a group.
 */
export const METHOD_TOPICS = {
  'twelve-months': 'How twelve months are read',
  'statement-checks': 'How the figures of a statement are checked',
  'covenant-tests': 'How a covenant is tested',
  'covenant-ebitda': 'How covenant EBITDA is reached',
  'leverage-measures': 'How leverage is measured',
  'cover-measures': 'How cover of charges is measured',
  'property-measures': 'How loan to value and debt yield are measured',
  'balance-measures': 'How liquid assets, net worth and gearing are measured',
  'expenditure-limit': 'How capital expenditure is held against its limit',
  'other-currencies': 'How another currency is translated',
  headroom: 'How headroom is computed',
  'smallest-headroom': 'How the smallest headroom is found',
  'sounding-strip': 'How the last twelve tests are drawn',
  exposure: 'How drawn and limit are added up',
  'cures-and-waivers': 'How cures, waivers and resets are read',
  'counterfactual-tests': 'How a test is computed on other earnings',
  'reporting-quality': 'How reporting quality is scored',
  'unexplained-accruals': 'How unexplained accruals are found',
  'sharpest-stretch': 'How the sharpest stretch is found',
  'cash-conversion': 'How cash conversion is computed',
  'published-screens': 'How published screens enter the score',
  'accrual-noise': 'How accrual noise is computed',
  'peer-standing': 'How a borrower is ranked among peers',
  accruals: 'How accruals are computed as published',
  'jones-models': 'How discretionary accruals are fitted',
  'm-score': 'How the M-score is computed',
  'f-score': 'How the F-score is computed',
  'real-activities': 'How real activities are fitted',
  smoothing: 'How smoothing is described',
  'altman-z': 'How the two Z-scores are computed',
  'ohlson-zmijewski': 'How the O-score and the X-score are computed',
  'beside-the-score': 'How facts beside the score are counted',
  'just-passing-patterns': 'How tests near the limit are read',
  'book-pattern': 'How the book’s own test is made',
  'leading-digits': 'How leading digits are tested',
  'coming-tests': 'How tests to come are projected',
  sensitivity: 'How far figures may move is computed',
  alerts: 'How alerts are raised',
  'alert-due-dates': 'How the due date of an alert is set',
  'data-cut-off': 'How a result is dated',
  'policy-changes': 'How the policy changes',
  'statement-due-dates': 'How days late are counted',
  watchlist: 'How the watchlist is kept',
  'why-it-moved': 'How a change is split into its causes',
} as const;

export type MethodTopic = keyof typeof METHOD_TOPICS;

export const METHOD_TOPIC_NAMES = Object.keys(METHOD_TOPICS) as readonly MethodTopic[];
