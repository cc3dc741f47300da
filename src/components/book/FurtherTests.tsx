import type { BookPattern } from '../../core/patterns/bookPattern.ts';
import { REMOVALS } from '../../core/patterns/headroomRow.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Facts, type Fact } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';
import { countText, errorText, pText, rightText, signed, zText } from './bookWords.ts';

/** Whether other tests say the same, and what was left out before any of them. */
export function FurtherTests({ pattern }: { readonly pattern: BookPattern }) {
  return (
    <div className="two-panels">
      <Panel title="Other tests of the same" aside={<MethodLink topic="book-pattern" />}>
        <Facts text facts={otherTests(pattern)} />
        <p className="type-second mt-2">
          The two sides of the limit are not two pieces of evidence: one wave in the counts moves both.
        </p>
      </Panel>
      <Panel title="What was left out" aside={<MethodLink topic="book-pattern" />}>
        <Facts facts={leftOut(pattern)} />
        <p className="type-second mt-2">
          Each of these can put a result just inside the limit, or take one from just outside it, with no
          choice at all. A certificate that never came has no result and is not counted anywhere.
        </p>
      </Panel>
    </div>
  );
}

function otherTests({ secondScale, densityBreak, signTest, discrete, excess }: BookPattern): readonly Fact[] {
  const { halfBandwidth, defaultBandwidth } = densityBreak;
  const densityText = (found: typeof halfBandwidth): string =>
    found.ok
      ? `${signed(found.value.estimate)} (standard error ${found.value.standardError.toFixed(2)}), z ${zText(found.value.statistic)}, ${pText(found.value.pAtLeast)}`
      : errorText(found.error);
  return [
    { label: 'On a second scale, over the type’s median level', value: rightText(secondScale) },
    { label: 'Density at the limit, McCrary at half the bandwidth', value: densityText(halfBandwidth) },
    {
      label: 'The same at the usual bandwidth, which rejects too often',
      value: densityText(defaultBandwidth),
    },
    {
      label: 'Approximate sign test, Bugni and Canay',
      value: signTest.ok
        ? `${countText(signTest.value.atOrAbove)} of the ${countText(signTest.value.nearest)} nearest on the passing side, ${pText(signTest.value.pAtLeast)}`
        : errorText(signTest.error),
    },
    {
      label: 'Rounded ratios, Frandsen',
      value: discrete
        ? `${countText(discrete.counts.at)} of ${countText(discrete.n)} round to the level itself, ${pText(discrete.pAtLeast)}; ${countText(discrete.rounded)} tests under agreements that round`
        : 'not shown: no agreement here rounds its ratio',
    },
    {
      label: 'Interval of the excess',
      value: excess.ok
        ? `${countText(excess.value.draws)} draws of ${countText(excess.value.n)} borrowers, each with all of its tests, seed ${excess.value.seed}`
        : errorText(excess.error),
    },
  ];
}

const REMOVAL_WORDS = {
  waived: 'Waived',
  reset: 'First test under a reset level',
  cured: 'Cured by money of the owners',
  'first test': 'First test of a covenant',
} as const;

const leftOut = ({ removed, withoutHeadroom, n }: BookPattern): readonly Fact[] => [
  ...REMOVALS.map((removal) => ({ label: REMOVAL_WORDS[removal], value: countText(removed[removal]) })),
  { label: 'Counted, ratio without meaning or net cash', value: countText(withoutHeadroom) },
  { label: 'Counted in all', value: countText(n) },
];
