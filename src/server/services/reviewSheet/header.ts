/** Section 1: who, what the figures rest on, who may read it. */
import type { SheetBlock, SheetCell } from '../../../contracts/reviewSheet.ts';
import { formatInstant } from '../../../core/calendar/printInstant.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { formatMoney } from '../../../core/money/print.ts';
import { absent, dayCell, notRecorded, textCell, textOrNotRecorded } from './cells.ts';
import type { SheetMaterial } from './material.ts';

const CONFIDENTIALITY =
  'Confidential. For the credit committee and those who prepare its decisions; not for the borrower, nor for other lenders.';

const PRIVATE_SIDE =
  'Private side: the borrower has listed securities. Need to know only; every export is logged.';

export const privateSideMark = ({ view }: SheetMaterial): string | null =>
  view.isListed ? PRIVATE_SIDE : null;

/** Stands on every printed page. */
export function basisLine({ view: { computed } }: SheetMaterial): string {
  return computed
    ? `data cut-off ${instant(computed.dataCutOff)}, method ${computed.methodVersion}, policy ${computed.policyVersion}, input version ${computed.inputVersion}`
    : 'not assessed yet';
}

export function headerSection(material: SheetMaterial): readonly SheetBlock[] {
  const { view, sectorScheme, madeAt } = material;
  const facts: readonly (readonly [string, SheetCell])[] = [
    ['Borrower', textCell(view.name)],
    ['Group', notRecorded],
    ['LEI', textOrNotRecorded(view.lei)],
    ['Sector', textCell(`${view.sectorCode} ${view.sectorLabel} (${sectorScheme})`)],
    ['Country', textCell(view.country)],
    ['Reporting currency', textCell(view.currency)],
    ['Facilities', textOrNotRecorded(view.facilities.map(facilityText).join('; '))],
    ['Desk', textCell(view.deskName)],
    ['Relationship manager', textCell(view.managerName)],
    ['Analyst', textCell(view.analystName)],
    ...basisFacts(material),
    ['Sheet', textCell('DRAFT, not signed: no version number yet')],
    ['Made on', textCell(formatInstant(madeAt, 'UTC'))],
  ];
  const mark = privateSideMark(material);
  return [
    { kind: 'facts', facts: facts.map(([label, value]) => ({ label, value })) },
    { kind: 'paragraph', text: CONFIDENTIALITY },
    ...(mark === null ? [] : [{ kind: 'paragraph' as const, text: mark }]),
  ];
}

function basisFacts({ view: { computed } }: SheetMaterial): readonly (readonly [string, SheetCell])[] {
  if (!computed) return [['Data cut-off', absent('not assessed yet')]];
  const peers = computed.peersAsOf === null ? absent('no peers') : dayCell(computed.peersAsOf);
  return [
    ['Data cut-off', textCell(instant(computed.dataCutOff))],
    ['Business date', dayCell(computed.asOf)],
    ['Peers as of', computed.peersAreLastNights ? textCell(`last night, ${peers.text}`) : peers],
    ['Method version', textCell(computed.methodVersion)],
    ['Policy version', textCell(String(computed.policyVersion))],
    ['Input version', textCell(String(computed.inputVersion))],
  ];
}

const instant = (iso: string): string => formatInstant(new Date(iso), 'UTC');

const facilityText = (facility: SheetMaterial['view']['facilities'][number]): string =>
  `${facility.name}, ${facility.kind}, ${facility.currency} ${formatMoney(decimal(facility.limit))}, to ${dayText(facility.maturesOn)}`;
