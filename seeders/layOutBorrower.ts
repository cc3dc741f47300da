import type { Transaction } from 'sequelize';
import { addDays, type PlainDate } from '../src/core/calendar/plainDate.ts';
import { decimal } from '../src/core/money/decimal.ts';
import { insertBorrower } from '../src/server/db/repositories/borrowers.ts';
import {
  insertAddBacks,
  insertCovenant,
  insertCovenantLevels,
  insertEquityCure,
  insertWaiver,
} from '../src/server/db/repositories/covenants.ts';
import { insertFacility } from '../src/server/db/repositories/facilities.ts';
import { insertUndertaking } from '../src/server/db/repositories/undertakings.ts';
import { levelsOf, termsOf } from './demo/agreedTerms.ts';
import type { DemoBorrower } from './demo/demoBorrower.ts';
import type { DemoCovenant } from './demo/demoCovenant.ts';
import type { LaidOutDesk, LaidOutPeople } from './layOutPeople.ts';

const THOUSAND = 1_000;

/** Of a day, in working hours. */
export const instantOn = (day: PlainDate, clock = '09:00'): Date => new Date(`${day}T${clock}:00.000Z`);

interface Place extends LaidOutDesk {
  readonly managerId: number;
}

/** The borrower with its facilities, covenants and undertaking, as agreed on the day the facilities began. */
export async function layOutBorrower(
  tx: Transaction,
  borrower: DemoBorrower,
  people: LaidOutPeople,
): Promise<number> {
  const place = placeOf(borrower, people);
  const [facility] = borrower.facilities;
  const [covenant] = borrower.covenants;
  if (!facility || !covenant) throw new Error(`${borrower.name} has no facility or no covenant`);
  const agreedAt = instantOn(facility.startsOn);
  const borrowerId = await insertBorrower(tx, {
    name: borrower.name,
    legalForm: borrower.legalForm,
    lei: borrower.lei,
    isListed: borrower.isListed,
    sectorCode: borrower.sector.code,
    country: borrower.country,
    currency: borrower.currency,
    fiscalYearEndMonth: borrower.fiscalYearEndMonth,
    reportsEveryMonths: 3,
    deskId: place.deskId,
    relationshipManagerId: place.managerId,
    analystId: place.analystId,
    now: agreedAt,
  });
  const facilityIds: number[] = [];
  for (const { limit, drawn, ...rest } of borrower.facilities)
    facilityIds.push(
      await insertFacility(tx, {
        ...rest,
        borrowerId,
        currency: borrower.currency,
        limit: decimal(limit).times(THOUSAND),
        drawn: decimal(drawn).times(THOUSAND),
      }),
    );
  for (const agreed of [...borrower.covenants, ...borrower.furtherCovenants])
    await layOutCovenant(tx, agreed, {
      borrower,
      place,
      borrowerId,
      facilityId: facilityIds[agreed.facilityNumber ?? 0] ?? facilityIds[0] ?? 0,
      agreedOn: facility.startsOn,
      granterId: people.committeeIds[1] ?? 0,
    });
  await insertUndertaking(tx, {
    borrowerId,
    kind: 'quarterly accounts',
    everyMonths: 3,
    dueDays: borrower.dueDays,
    dayCount: 'calendar',
    graceDays: borrower.graceDays,
    firstPeriodEnd: covenant.firstTestOn,
    knownFrom: agreedAt,
  });
  return borrowerId;
}

export function placeOf({ desk, managerNumber }: DemoBorrower, { desks }: LaidOutPeople): Place {
  const laidOut = desks.get(desk);
  const managerId = laidOut?.managerIds[managerNumber % laidOut.managerIds.length];
  if (!laidOut || managerId === undefined) throw new Error(`${desk} has no relationship manager`);
  return { ...laidOut, managerId };
}

interface CovenantPlace {
  readonly borrower: DemoBorrower;
  readonly place: Place;
  readonly borrowerId: number;
  readonly facilityId: number;
  readonly agreedOn: PlainDate;
  readonly granterId: number;
}

async function layOutCovenant(tx: Transaction, agreed: DemoCovenant, at: CovenantPlace): Promise<void> {
  const { borrower, place, borrowerId, facilityId, agreedOn } = at;
  const agreedAt = instantOn(agreedOn);
  const covenantId = await insertCovenant(tx, {
    borrowerId,
    facilityId,
    validFrom: agreedOn,
    knownFrom: agreedAt,
    terms: termsOf(agreed, borrower.currency),
  });
  await insertCovenantLevels(tx, covenantId, levelsOf(agreed), agreedAt);

  // The latest add-back waits for its second person.
  const latest = agreed.addBacks.at(-1)?.periodEnd;
  await insertAddBacks(
    tx,
    covenantId,
    agreed.addBacks.map(({ amount, ...addBack }) => ({
      ...addBack,
      months: 3,
      amount: decimal(amount).times(THOUSAND),
      recordedBy: place.analystId,
      checkedBy: addBack.periodEnd === latest ? null : place.managerId,
      knownFrom: instantOn(addDays(addBack.periodEnd, borrower.usualDelayDays), '11:00'),
    })),
  );
  for (const cure of agreed.cures ?? [])
    await insertEquityCure(tx, {
      ...cure,
      amount: decimal(cure.amount).times(THOUSAND),
      covenantId,
      recordedBy: place.analystId,
      knownFrom: instantOn(cure.receivedOn, '14:00'),
    });
  if (agreed.waiver)
    await insertWaiver(tx, {
      ...agreed.waiver,
      covenantId,
      grantedBy: at.granterId,
      knownFrom: instantOn(agreed.waiver.grantedOn, '15:00'),
    });
}
