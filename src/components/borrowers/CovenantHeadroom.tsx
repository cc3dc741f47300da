import type { CovenantView } from '../../contracts/borrowers.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { MEASURES } from '../../core/measures/index.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatMoney, formatScore, formatShare } from '../../core/money/print.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { HeadroomText, OutcomeText } from '../marks/OutcomeText.tsx';
import { Facts } from '../ui/Facts.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { limitText } from './figures.ts';

/** Headroom in every form against the level of the test date. */
export function CovenantHeadroom({ covenant }: { readonly covenant: CovenantView }) {
  return (
    <section>
      <h3 className="type-heading">
        Headroom <MethodLink topic="headroom" />
      </h3>
      <Facts facts={headroomFacts(covenant)} />
    </section>
  );
}

const share = (value: string | null) => (value === null ? 'n.m.' : formatShare(decimal(value)));

/** 'Earnings may fall'; of a test without earnings what may move instead: 'Value may fall', 'Capital expenditure may rise'. */
function roomLabel({ fallOf, measure }: CovenantView): string {
  if (fallOf === 'earnings') return 'Earnings may fall';
  const { subject, room } = MEASURES[measure].words;
  return `${subject} ${room?.may ?? 'may fall'}`;
}

function headroomFacts(covenant: CovenantView) {
  const { headroom, roomInDeviations } = covenant;
  if (!headroom) return [];
  const money = (value: string | null) =>
    value === null ? 'n.m.' : `${covenant.currency} ${formatMoney(decimal(value))}`;
  return [
    {
      label: roomLabel(covenant),
      value: share(headroom.mayFall),
    },
    { label: 'In money', value: money(headroom.moneyLeft) },
    { label: 'Share of level', value: share(headroom.shareOfLevel) },
    ...(headroom.otherSideMayRise === null
      ? []
      : [
          {
            label: `${otherSideOf(covenant)} may rise`,
            value: `${money(headroom.otherSideMayRise)}, ${share(headroom.otherSideShare)}`,
          },
        ]),
    ...(roomInDeviations === null
      ? []
      : [
          {
            label: 'The money over the usual move of EBITDA in a quarter',
            value: `${formatScore(decimal(roomInDeviations), { places: 1 })} standard deviations`,
          },
        ]),
  ];
}

/** "Net debt", as the measure names what stands on the other side. */
function otherSideOf({ measure }: CovenantView): string {
  const name = MEASURES[measure].words.otherSide ?? 'the other side';
  return name.charAt(0).toUpperCase() + name.slice(1);
}

/** Today's result against every level that is agreed for later. */
export function LaterLevels({ covenant }: { readonly covenant: CovenantView }) {
  if (covenant.laterLevels.length === 0) return null;
  return (
    <section>
      <h3 className="type-heading">Against the levels agreed for later</h3>
      <ScrollRegion label="Levels agreed for later">
        <Table caption="Today’s result against the levels agreed for later">
          <TableHead>
            <tr role="row">
              <HeadCell>From</HeadCell>
              <HeadCell>Limit</HeadCell>
              <HeadCell numeric>{roomLabel(covenant)}</HeadCell>
              <HeadCell numeric>In money</HeadCell>
              <HeadCell numeric>Share of level</HeadCell>
              <HeadCell numeric>{otherSideOf(covenant)} may rise</HeadCell>
              <HeadCell>Today’s result</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {covenant.laterLevels.map((later) => (
              <Row key={later.from}>
                <Cell nowrap>{dayText(later.from)}</Cell>
                <Cell nowrap>{limitText(covenant, later.level)}</Cell>
                <Cell numeric nowrap>
                  <HeadroomText mayFall={later.mayFall} outcome={later.outcome} />
                </Cell>
                <Cell numeric nowrap>
                  {moneyOf(later.moneyLeft)}
                </Cell>
                <Cell numeric nowrap>
                  {share(later.shareOfLevel)}
                </Cell>
                <Cell numeric nowrap>
                  {moneyOf(later.otherSideMayRise)}
                </Cell>
                <Cell>
                  <OutcomeText outcome={later.outcome} />
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </ScrollRegion>
    </section>
  );
}

const moneyOf = (value: string | null): string => (value === null ? '–' : formatMoney(decimal(value)));
