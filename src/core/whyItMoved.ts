/** Why a result is another than the night before: one part of its basis exchanged at a time, in a fixed order. */
import type { AlertKind } from './alerts/alert.ts';
import { assess, type Assessment } from './assess.ts';
import type { BookCrossSection } from './bookCrossSection.ts';
import type { BorrowerInputs } from './borrowerInputs.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import type { Covenant } from './covenants/covenant.ts';
import { spokenTest } from './covenants/spokenTest.ts';
import { decimal, type Decimal } from './money/decimal.ts';
import type { Policy } from './policy.ts';

/** In the order in which they are exchanged; another order would split a change that two of them share otherwise. */
export const CAUSES = ['method', 'time', 'new figures', 'level', 'terms', 'policy', 'peers'] as const;
export type Cause = (typeof CAUSES)[number];

/** What a result rests on. */
export interface Basis {
  readonly inputs: BorrowerInputs;
  readonly crossSection: BookCrossSection;
  readonly policy: Policy;
  readonly asOf: PlainDate;
}

export type Subject =
  | { readonly kind: 'test'; readonly covenantId: number }
  | { readonly kind: 'score' }
  | { readonly kind: 'alert'; readonly alert: AlertKind; readonly covenantId: number | null };

/** How a subject stands: a word (outcome, band, severity), and the figure behind it where there is one. */
export interface Standing {
  readonly word: string;
  /** Tested ratio or amount, or points of the score; null where it has none. */
  readonly figure: Decimal | null;
  readonly level: Decimal | null;
  readonly on: PlainDate | null;
}

/** The steps lead from `before` to `after` without a gap. */
export interface Movement {
  readonly subject: Subject;
  readonly before: Standing;
  readonly after: Standing;
  readonly steps: readonly { readonly cause: Cause; readonly from: Standing; readonly to: Standing }[];
}

/**
 * Every test, score and alert that stands otherwise than before, with what each cause added. `before.result` is as it
 * was stored, so that a change of method is seen: the earlier basis under today's method.
 *
 * @example whyItMoved({ basis: { inputs, crossSection, policy: POLICY_VERSION_1, asOf: '2026-11-30' }, result: assessment }, { basis: { inputs, crossSection, policy: POLICY_VERSION_1, asOf: '2026-11-30' }, result: assessment }) // => []
 */
export function whyItMoved(
  before: { readonly basis: Basis; readonly result: Assessment },
  now: { readonly basis: Basis; readonly result: Assessment },
): readonly Movement[] {
  if (moved(before.result, now.result).length === 0) return [];
  const stages = stagesBetween(before, now);
  return moved(before.result, now.result).map((subject) => {
    const standings = stages.map(({ cause, result }) => ({ cause, standing: standingOf(result, subject) }));
    const steps = standings.slice(1).flatMap(({ cause, standing }, place) => {
      const from = standings[place]!.standing;
      return isSame(from, standing) ? [] : [{ cause, from, to: standing }];
    });
    return { subject, before: standings[0]!.standing, after: standings.at(-1)!.standing, steps };
  });
}

interface Stage {
  /** What was exchanged to come here; the first stage is where it began. */
  readonly cause: Cause;
  readonly result: Assessment;
}

/**
 * A part that did not change makes no stage; the last stage is today's result itself. Where nothing that it rests on
 * changed, it was computed otherwise.
 */
function stagesBetween(
  before: { readonly basis: Basis; readonly result: Assessment },
  now: { readonly basis: Basis; readonly result: Assessment },
): readonly Stage[] {
  const changes = exchanges(before, now).filter(({ isChanged }) => isChanged);
  const stages: Stage[] = [{ cause: 'method', result: before.result }];
  if (changes.length === 0) stages.push({ cause: 'method', result: now.result });
  let basis = before.basis;
  changes.forEach(({ cause, exchange }, place) => {
    basis = exchange(basis);
    const isLast = place === changes.length - 1;
    stages.push({ cause, result: isLast ? now.result : resultOn(basis) });
  });
  return stages;
}

const resultOn = ({ inputs, crossSection, policy, asOf }: Basis): Assessment =>
  assess(inputs, crossSection, policy, asOf);

interface Exchange {
  readonly cause: Cause;
  readonly isChanged: boolean;
  readonly exchange: (basis: Basis) => Basis;
}

function exchanges(
  before: { readonly basis: Basis; readonly result: Assessment },
  { basis: now, result }: { readonly basis: Basis; readonly result: Assessment },
): readonly Exchange[] {
  const { basis } = before;
  const covenants = (of: (now: Covenant, then: Covenant) => Partial<Covenant>) => (held: Basis) => ({
    ...held,
    inputs: {
      ...held.inputs,
      covenants: held.inputs.covenants.map((then) => {
        const today = now.inputs.covenants.find(({ id }) => id === then.id);
        return today ? { ...then, ...of(today, then) } : then;
      }),
    },
  });
  const withFigures = (held: Basis): Basis => {
    const { inputs } = covenants(({ addBacks }) => ({ addBacks }))(held);
    return { ...held, inputs: { ...inputs, ...withoutTerms(now.inputs) } };
  };
  return [
    {
      cause: 'method',
      isChanged: before.result.methodVersion !== result.methodVersion,
      exchange: (held) => held,
    },
    {
      cause: 'time',
      isChanged: basis.asOf !== now.asOf || differs(basis.inputs.previous, now.inputs.previous),
      exchange: (held) => ({
        ...held,
        asOf: now.asOf,
        inputs: { ...held.inputs, previous: now.inputs.previous },
      }),
    },
    {
      cause: 'new figures',
      isChanged: differs(figuresOf(basis.inputs), figuresOf(now.inputs)),
      exchange: withFigures,
    },
    {
      cause: 'level',
      isChanged: differs(levelsOf(basis.inputs), levelsOf(now.inputs)),
      exchange: covenants(({ levels }) => ({ levels })),
    },
    {
      cause: 'terms',
      isChanged: differs(termsOf(basis.inputs), termsOf(now.inputs)),
      exchange: (held) => ({ ...held, inputs: { ...held.inputs, covenants: now.inputs.covenants } }),
    },
    {
      cause: 'policy',
      isChanged: basis.policy.version !== now.policy.version,
      exchange: (held) => ({ ...held, policy: now.policy }),
    },
    {
      cause: 'peers',
      isChanged: basis.crossSection.version !== now.crossSection.version,
      exchange: (held) => ({ ...held, crossSection: now.crossSection }),
    },
  ];
}

const differs = (before: unknown, now: unknown): boolean => JSON.stringify(before) !== JSON.stringify(now);

const withoutTerms = ({ covenants: _covenants, previous: _previous, ...rest }: BorrowerInputs) => rest;

const figuresOf = (inputs: BorrowerInputs) => ({
  ...withoutTerms(inputs),
  inputVersion: null,
  addBacks: inputs.covenants.map(({ id, addBacks }) => ({ id, addBacks })),
});

const levelsOf = ({ covenants }: BorrowerInputs) => covenants.map(({ id, levels }) => ({ id, levels }));

/** All else that is agreed: definitions, operators, waivers, cures, and covenants that came or went. */
const termsOf = ({ covenants }: BorrowerInputs) =>
  covenants.map(({ addBacks: _addBacks, levels: _levels, ...terms }) => terms);

function moved(before: Assessment, now: Assessment): readonly Subject[] {
  return subjectsOf(before, now).filter(
    (subject) => !isSame(standingOf(before, subject), standingOf(now, subject)),
  );
}

function subjectsOf(before: Assessment, now: Assessment): readonly Subject[] {
  const both = [before, now];
  const covenantIds = new Set(both.flatMap(({ tests }) => tests.map(({ covenantId }) => covenantId)));
  const alerts = new Map(
    both
      .flatMap(({ findings }) => findings)
      .map(({ kind, covenantId }) => [
        `${kind} ${covenantId}`,
        { kind: 'alert' as const, alert: kind, covenantId },
      ]),
  );
  return [
    ...[...covenantIds].map((covenantId) => ({ kind: 'test' as const, covenantId })),
    { kind: 'score' },
    ...alerts.values(),
  ];
}

const NO_ALERT: Standing = { word: 'no alert', figure: null, level: null, on: null };
const NOT_TESTED: Standing = { word: 'not tested yet', figure: null, level: null, on: null };

function standingOf(result: Assessment, subject: Subject): Standing {
  switch (subject.kind) {
    case 'test': {
      const test = spokenTest(result.tests.filter(({ covenantId }) => covenantId === subject.covenantId));
      if (!test) return NOT_TESTED;
      return { word: test.outcome, figure: test.tested, level: test.level, on: test.testDate };
    }
    case 'score': {
      const { headline, band, latest } = result.quality;
      return {
        word: band ?? 'no score',
        // Whole points, as they are printed: peers move the decimals every night.
        figure: headline === null ? null : decimal(Math.round(headline)),
        level: null,
        on: latest?.quarterEnd ?? null,
      };
    }
    case 'alert': {
      const finding = result.findings.find(
        ({ kind, covenantId }) => kind === subject.alert && covenantId === subject.covenantId,
      );
      return finding ? { word: finding.severity, figure: null, level: null, on: finding.factDate } : NO_ALERT;
    }
  }
}

const isSame = (one: Standing, other: Standing): boolean =>
  one.word === other.word &&
  one.on === other.on &&
  sameFigure(one.figure, other.figure) &&
  sameFigure(one.level, other.level);

const sameFigure = (one: Decimal | null, other: Decimal | null): boolean =>
  one === null || other === null ? one === other : one.eq(other);
