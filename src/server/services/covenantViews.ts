import type { BridgeRow, CovenantView, SourceLink, TestView } from '../../contracts/borrowers.ts';
import type { Assessment } from '../../core/assess.ts';
import type { Covenant } from '../../core/covenants/covenant.ts';
import type { CovenantTest } from '../../core/covenants/covenantTest.ts';
import { shownOutcome } from '../../core/covenants/rights.ts';
import { spokenTest } from '../../core/covenants/spokenTest.ts';
import { whatIsLeft } from '../../core/covenants/whatIsLeft.ts';
import { measureUnit } from '../../core/measures/index.ts';
import type { Decimal } from '../../core/money/decimal.ts';
import type { InputUsed } from '../../core/measures/measure.ts';
import { lineItem, type LineItemCode } from '../../core/statements/lineItems.ts';
import type { CheckRecord } from '../db/repositories/covenantTests.ts';

interface Beside {
  readonly facilities: readonly { readonly id: number; readonly name: string }[];
  readonly checks: readonly CheckRecord[];
  /** The just-passing band of the policy that the assessment went by. */
  readonly band: Decimal;
}

/** A covenant with its tests as the stored result has them; decimals become text here, once. */
export function toCovenantViews(
  covenants: readonly Covenant[],
  assessment: Assessment,
  beside: Beside,
): CovenantView[] {
  return covenants.map((covenant) => {
    const tests = assessment.tests.filter((test) => test.covenantId === covenant.id);
    const shown = spokenTest(tests);
    const check = beside.checks.find(
      (one) => one.covenantId === covenant.id && one.testDate === shown?.testDate,
    );
    const pattern = assessment.patterns.find((one) => one.covenantId === covenant.id);
    return {
      id: covenant.id,
      name: covenant.name,
      clause: covenant.clause,
      facilityName: beside.facilities.find((facility) => facility.id === covenant.facilityId)?.name ?? '',
      measure: covenant.measure,
      unit: measureUnit(covenant.measure),
      currency: covenant.currency,
      operator: covenant.operator,
      roundingPlaces: covenant.roundingPlaces,
      isOurs: covenant.isOurs,
      tests: tests.map((test) => toTestView(test, beside.band)),
      ...latestParts(covenant, shown),
      nearLine: assessment.nearLine.find((one) => one.covenantId === covenant.id) ?? null,
      pattern: pattern ? { inBand: pattern.inBand, ofLast: pattern.ofLast, run: pattern.run } : null,
      checking: check?.checking ?? 'preliminary',
      certified: check?.certifiedValue ?? null,
    };
  });
}

type Rights = Pick<CovenantView, 'roomInDeviations' | 'springing' | 'waiver' | 'cure'>;

type LatestParts = Rights &
  Pick<
    CovenantView,
    | 'fallOf'
    | 'whatIsLeft'
    | 'headroom'
    | 'laterLevels'
    | 'bridge'
    | 'otherAccounting'
    | 'counterfactuals'
    | 'sources'
    | 'missing'
  >;

const rightsOf = ({ roomInDeviations, springing, waiver, cure }: CovenantTest): Rights => ({
  roomInDeviations: textOf(roomInDeviations),
  springing: springing && {
    drawn: springing.drawn.toFixed(),
    commitment: springing.commitment.toFixed(),
    utilisation: textOf(springing.utilisation),
    trigger: springing.trigger.toFixed(),
  },
  waiver,
  cure: cure && {
    ...cure,
    needed: {
      ebitda: textOf(cure.needed.ebitda),
      debt: textOf(cure.needed.debt),
      both: textOf(cure.needed.both),
    },
    received: textOf(cure.received),
    counted: textOf(cure.counted),
    carried: cure.carried.toFixed(),
    ratioWith: textOf(cure.ratioWith),
  },
});

const textOf = (amount: Decimal | null): string | null => amount?.toFixed() ?? null;

function latestParts(covenant: Covenant, test: CovenantTest | undefined): LatestParts {
  if (!test)
    return {
      fallOf: 'earnings',
      whatIsLeft: 'Not tested yet',
      headroom: null,
      roomInDeviations: null,
      springing: null,
      waiver: null,
      cure: null,
      laterLevels: [],
      bridge: [],
      otherAccounting: null,
      counterfactuals: [],
      sources: [],
      missing: [],
    };
  const { headroom } = test;
  return {
    fallOf: headroom.fallOf,
    whatIsLeft: whatIsLeft(test),
    headroom: {
      absolute: headroom.absolute?.toFixed() ?? null,
      shareOfLevel: headroom.shareOfLevel?.toFixed() ?? null,
      mayFall: headroom.mayFall?.toFixed() ?? null,
      moneyLeft: headroom.moneyLeft?.toFixed() ?? null,
      otherSideMayRise: headroom.otherSideMayRise?.toFixed() ?? null,
      otherSideShare: headroom.otherSideShare?.toFixed() ?? null,
    },
    laterLevels: test.againstLaterLevels.map((later) => ({
      from: later.from,
      level: later.level.toFixed(),
      outcome: shownOutcome(covenant, later.outcome),
      mayFall: later.mayFall?.toFixed() ?? null,
      shareOfLevel: later.shareOfLevel?.toFixed() ?? null,
      moneyLeft: later.moneyLeft?.toFixed() ?? null,
      otherSideMayRise: later.otherSideMayRise?.toFixed() ?? null,
    })),
    ...rightsOf(test),
    bridge: test.bridge.map((line): BridgeRow => ({
      label: line.label,
      amount: line.amount.toFixed(),
      kind: line.kind,
      note: line.note ?? null,
      sources: line.inputs.map(toSource),
    })),
    otherAccounting: test.otherAccounting && {
      ratio: test.otherAccounting.tested?.toFixed() ?? null,
      outcome: test.otherAccounting.outcome,
    },
    counterfactuals: test.counterfactuals.map((other) => ({
      label: other.kind,
      takenOut: other.earningsTakenOut.toFixed(),
      ratio: other.ratio?.toFixed() ?? null,
      outcome: shownOutcome(covenant, other.outcome),
      breakEvenShare: other.breakEvenShare?.toFixed() ?? null,
    })),
    sources: test.inputs.map(toSource),
    missing: test.missing.map(
      (gap) =>
        `${gap.line === 'statement' ? 'the accounts' : labelOf(gap.line)}, ${gap.months === 0 ? 'at' : `${gap.months} months to`} ${gap.periodEnd}`,
    ),
  };
}

const labelOf = (line: LineItemCode): string => lineItem(line).label;

const toTestView = (test: CovenantTest, band: Decimal): TestView => ({
  testDate: test.testDate,
  level: test.level?.toFixed() ?? null,
  tested: test.tested?.toFixed() ?? null,
  numerator: test.numerator?.toFixed() ?? null,
  denominator: test.denominator?.toFixed() ?? null,
  outcome: test.outcome,
  underlyingOutcome: test.underlyingOutcome,
  reason: test.reason,
  mayFall: test.headroom.mayFall?.toFixed() ?? null,
  shareOfLevel: test.headroom.shareOfLevel?.toFixed() ?? null,
  justPassing: test.justPassing,
  band: band.toFixed(),
  withoutAddBacks:
    test.counterfactuals.find((other) => other.kind === 'without add-backs')?.ratio?.toFixed() ?? null,
  isFirstUnderReset: test.isFirstUnderReset,
});

const toSource = (input: InputUsed): SourceLink => ({
  statementId: input.statementId,
  line: input.line,
  label: labelOf(input.line),
  amount: input.amount.toFixed(),
  sign: input.sign,
  periodEnd: input.periodEnd,
  months: input.months,
});
