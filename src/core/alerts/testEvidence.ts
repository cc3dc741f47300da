import { formatDay } from '../calendar/printDay.ts';
import type { Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { covenantInWords, levelInWords, OPERATOR_WORDS, testedInWords } from '../covenants/wording.ts';
import { MEASURES } from '../measures/index.ts';
import { formatMoney, formatShare } from '../money/print.ts';
import type { AlertFinding } from './alert.ts';

/**
 * The facts behind every alert on a test: what was tested, against what, with what room.
 *
 * @example testEvidence(covenant, test).map(({ label }) => label).slice(0, 3) // => ['Covenant', 'Test date', 'Result']
 */
export function testEvidence(covenant: Covenant, test: CovenantTest): AlertFinding['evidence'] {
  const { measure, tested, level, headroom } = test;
  const { mayFall, moneyLeft, shareOfLevel } = headroom;
  return [
    { label: 'Covenant', value: covenantInWords(covenant) },
    { label: 'Test date', value: formatDay(test.testDate) },
    { label: 'Result', value: tested ? testedInWords(measure, tested, level) : 'no meaning' },
    ...(level
      ? [{ label: 'Level', value: `${OPERATOR_WORDS[test.operator]} ${levelInWords(measure, level)}` }]
      : []),
    { label: 'Outcome', value: test.outcome },
    ...(mayFall
      ? [
          {
            label:
              headroom.fallOf === 'earnings'
                ? 'Earnings may fall'
                : `Tested amount ${MEASURES[measure].words.room?.may ?? 'may fall'}`,
            value: formatShare(mayFall),
          },
        ]
      : []),
    ...(moneyLeft ? [{ label: 'What is left', value: formatMoney(moneyLeft) }] : []),
    ...(shareOfLevel ? [{ label: 'Share of level', value: formatShare(shareOfLevel) }] : []),
    ...(test.cure?.ratioWith
      ? [{ label: 'With the money put in', value: testedInWords(measure, test.cure.ratioWith, level) }]
      : []),
    ...(test.reason ? [{ label: 'Remark', value: test.reason }] : []),
  ];
}
