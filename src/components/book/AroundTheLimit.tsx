import { POPULATION_NOT_BORROWER } from '../../core/cautions.ts';
import type { BookPattern } from '../../core/patterns/bookPattern.ts';
import { leadingTest } from '../../core/patterns/leadingTest.ts';
import {
  BOOK_SENTENCE,
  INNOCENT_REASONS,
  isDebtToEbitda,
  LEVERAGE_SENTENCE,
  LOW_POWER_SENTENCE,
  NO_PATTERN_SENTENCE,
} from '../../core/patterns/patternWording.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Facts, type Fact } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Caution } from '../ui/States.tsx';
import { countText, errorText, pText, rightText, shareText, signed, zText } from './bookWords.ts';

/** The counts on both sides of the limit against what their neighbours lead one to expect. */
export function AroundTheLimit({ pattern }: { readonly pattern: BookPattern }) {
  const { rejects, test } = leadingTest(pattern);
  return (
    <Panel title="Around the limit" aside={<MethodLink topic="book-pattern" />}>
      <Facts facts={factsOf(pattern)} />
      <p className="mt-3">{rejects ? BOOK_SENTENCE : NO_PATTERN_SENTENCE}</p>
      {pattern.hasLowPower && (
        <p className="mt-2">
          {LOW_POWER_SENTENCE} The {test} speaks here.
        </p>
      )}
      {pattern.isScaleDependent && (
        <p className="mt-2">
          <span className="type-name">Scale-dependent:</span> sign or significance is another where distances
          are not divided by each test’s own level.
        </p>
      )}
      <PooledTypes pattern={pattern} />
      <div className="cautions">
        <Caution>{POPULATION_NOT_BORROWER}</Caution>
        <Caution>{INNOCENT_REASONS}</Caution>
      </div>
    </Panel>
  );
}

function PooledTypes({ pattern: { byMeasure } }: { readonly pattern: BookPattern }) {
  const hasLeverage = byMeasure.some(({ name }) => isDebtToEbitda(name));
  return (
    <>
      {byMeasure.length > 1 && (
        <p className="mt-2">
          {byMeasure.length} types of covenant are pooled here, leverage with cover and amounts. Look at each
          type by itself below.
        </p>
      )}
      {hasLeverage && <p className="mt-2">{LEVERAGE_SENTENCE}</p>}
    </>
  );
}

function factsOf(pattern: BookPattern): readonly Fact[] {
  const { headline, otherWidths, placebos, excess } = pattern;
  const { bins, left, right, contrast } = headline;
  const isPassingMore = leadingTest(pattern).rejects && right.zMultinomial !== null;
  return [
    { label: 'Just passing, observed', value: countText(bins.right) },
    { label: 'Just passing, expected', value: right.expected.toFixed(1) },
    {
      label: 'Standardized difference',
      value: isPassingMore ? (
        <span className="text-magenta">{zText(right.zMultinomial)}</span>
      ) : (
        zText(right.zMultinomial)
      ),
    },
    { label: 'One-sided', value: pText(headline.pRight) },
    { label: 'With Burgstahler and Dichev’s own variance', value: zText(right.zIndependent) },
    ...otherWidths.map((sides) => ({
      label: `The same, intervals of ${shareText(sides.width)}`,
      value: rightText(sides),
    })),
    { label: 'Just failing, observed / expected', value: `${bins.left} / ${left.expected.toFixed(1)}` },
    { label: 'Just failing, standardized difference', value: zText(left.zMultinomial) },
    {
      label: 'Both sides in one, over four intervals',
      value: `${zText(contrast.z)}, ${pText(contrast.pValue)}`,
    },
    {
      label: `Placebo at ${placebos.map(({ cutoff }) => Math.round(cutoff * 100)).join(', ')}\u00a0%`,
      value: placebos.map(({ right: at }) => zText(at.zMultinomial, 1)).join('\u2002'),
    },
    {
      label: 'Tests beyond what the neighbours imply',
      value: excess.ok
        ? `${signed(excess.value.estimate, 1)} (95\u00a0%: ${signed(excess.value.low, 1)} to ${signed(excess.value.high, 1)})`
        : errorText(excess.error),
    },
  ];
}
