import { dayText } from '../../core/calendar/printDay.ts';
import type { BridgeRow, CovenantView } from '../../contracts/borrowers.ts';
import { spokenTest } from '../../core/covenants/spokenTest.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatMoney, formatShare } from '../../core/money/print.ts';
import { OutcomeText } from '../marks/OutcomeText.tsx';
import { Facts } from '../ui/Facts.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { amountText, limitText, periodText, sourceHref, testedText } from './figures.ts';

/** Headroom in every form, what the test would be otherwise, and the way from reported to covenant figures. */
export function CovenantDetail({ covenant }: { readonly covenant: CovenantView }) {
  const tested = spokenTest(covenant.tests);
  return (
    <div className="stack">
      {covenant.pattern && covenant.pattern.inBand > 0 && (
        <p>
          {covenant.pattern.inBand} of the last {covenant.pattern.ofLast} tests ended just passing
          {covenant.pattern.run > 1 && `, ${covenant.pattern.run} in a row`}.
        </p>
      )}
      <div className="two-panels">
        <section>
          <h3 className="type-heading">Headroom</h3>
          <Facts facts={headroomFacts(covenant)} />
        </section>
        <section>
          <h3 className="type-heading">Would the test have been met…</h3>
          <Facts
            facts={[
              ...(tested
                ? [
                    {
                      key: 'as reported',
                      label: 'As reported',
                      value: <OutcomeLine text={testedText(covenant, tested)} outcome={tested.outcome} />,
                    },
                  ]
                : []),
              ...covenant.counterfactuals.map((other) => ({
                key: other.label,
                label: `${sentence(other.label)} of ${formatMoney(decimal(other.takenOut))}`,
                value: (
                  <OutcomeLine
                    text={
                      other.ratio === null
                        ? 'n.m.'
                        : testedText(covenant, { tested: other.ratio, level: tested?.level ?? null })
                    }
                    outcome={other.outcome}
                  />
                ),
              })),
              ...covenant.counterfactuals
                .filter((other) => other.breakEvenShare !== null)
                .map((other) => ({
                  key: `${other.label} needed`,
                  label: 'Share of the add-backs that the test needs',
                  value: formatShare(decimal(other.breakEvenShare ?? '0')),
                })),
              ...covenant.laterLevels.map((later) => ({
                key: later.from,
                label: `Against ${limitText(covenant, later.level)} from ${dayText(later.from)}`,
                value: <OutcomeText outcome={later.outcome} />,
              })),
            ]}
          />
        </section>
      </div>
      {covenant.bridge.length > 0 && <Bridge rows={covenant.bridge} />}
      <Sources covenant={covenant} />
    </div>
  );
}

const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

function OutcomeLine({
  text,
  outcome,
}: {
  readonly text: string;
  readonly outcome: CovenantView['tests'][number]['outcome'];
}) {
  return (
    <>
      {text} <OutcomeText outcome={outcome} />
    </>
  );
}

function headroomFacts(covenant: CovenantView) {
  const { headroom, fallOf } = covenant;
  if (!headroom) return [];
  const share = (value: string | null) => (value === null ? 'n.m.' : formatShare(decimal(value)));
  const money = (value: string | null) =>
    value === null ? 'n.m.' : `${covenant.currency} ${formatMoney(decimal(value))}`;
  const otherSide = {
    'interest-cover': 'Interest may rise',
    'current-ratio': 'Current liabilities may rise',
  } as const;
  const other =
    covenant.measure in otherSide ? otherSide[covenant.measure as keyof typeof otherSide] : 'Debt may rise';
  return [
    {
      label: fallOf === 'earnings' ? 'Earnings may fall' : 'Tested amount may fall',
      value: share(headroom.mayFall),
    },
    { label: 'In money', value: money(headroom.moneyLeft) },
    { label: 'Share of level', value: share(headroom.shareOfLevel) },
    ...(headroom.otherSideMayRise === null
      ? []
      : [{ label: other, value: `${money(headroom.otherSideMayRise)}, ${share(headroom.otherSideShare)}` }]),
  ];
}

function Bridge({ rows }: { readonly rows: readonly BridgeRow[] }) {
  return (
    <section>
      <h3 className="type-heading">From reported to covenant figures</h3>
      <Table caption="Bridge from reported to covenant figures, whole currency units">
        <TableHead>
          <tr role="row">
            <HeadCell>Line</HeadCell>
            <HeadCell numeric>Amount</HeadCell>
            <HeadCell>From</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {rows.map((row, at) => (
            <Row key={`${at} ${row.label}`}>
              <Cell>
                {row.kind === 'subtotal' ? <span className="type-name">{row.label}</span> : row.label}
                {row.kind === 'disallowed' && <span className="type-second">, over the cap</span>}
              </Cell>
              <Cell numeric>{amountText(row.amount)}</Cell>
              <Cell>
                {row.sources.map((source, at) => (
                  <span key={`${source.statementId} ${source.line} ${source.sign}`}>
                    {at > 0 && (source.sign === -1 ? ' less ' : ', ')}
                    <a href={sourceHref(source.statementId, source.line)}>{periodText(source)}</a>
                  </span>
                ))}
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </section>
  );
}

function Sources({ covenant }: { readonly covenant: CovenantView }) {
  if (covenant.missing.length > 0) return <p>Missing: {covenant.missing.join('; ')}.</p>;
  return (
    <details>
      <summary className="cursor-pointer">Figures behind this test</summary>
      <Table caption="Figures behind the latest test, each leads to its cell">
        <TableHead>
          <tr role="row">
            <HeadCell>Line</HeadCell>
            <HeadCell>Period</HeadCell>
            <HeadCell numeric>Amount</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {covenant.sources.map((source) => (
            <Row key={`${source.statementId} ${source.line} ${source.sign}`}>
              <Cell>
                <a href={sourceHref(source.statementId, source.line)}>{source.label}</a>
              </Cell>
              <Cell>{periodText(source)}</Cell>
              <Cell numeric>
                {source.sign === -1 ? '−' : ''}
                {amountText(source.amount)}
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </details>
  );
}
