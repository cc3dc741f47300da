import type { Transaction } from 'sequelize';
import { addDeskMember, insertDesk, setDeskHead } from '../src/server/db/repositories/desks.ts';
import { insertLender, setLenderContacts } from '../src/server/db/repositories/lender.ts';
import { insertPerson } from '../src/server/db/repositories/people.ts';
import { DESK_NAMES, type DeskName } from './demo/borrowerTable.ts';
import { DEMO_PEOPLE, LENDER_NAME, LENDER_ZONE, NIGHT_AT_UTC } from './demo/people.ts';

/** Who works on a desk, by their ids. */
export interface LaidOutDesk {
  readonly deskId: number;
  readonly analystId: number;
  /** In the order of the list of people. */
  readonly managerIds: readonly number[];
}

export interface LaidOutPeople {
  readonly desks: ReadonlyMap<DeskName, LaidOutDesk>;
  readonly committeeIds: readonly number[];
}

/** The lender, its desks and its people. Every person has a hash of the one password. */
export async function layOutPeople(
  tx: Transaction,
  { seededOn, hashes, now }: { seededOn: string; hashes: readonly string[]; now: Date },
): Promise<LaidOutPeople> {
  await insertLender(tx, { name: LENDER_NAME, zone: LENDER_ZONE, nightAtUtc: NIGHT_AT_UTC, seededOn });
  const ids: number[] = [];
  for (const [index, { name, email, roles }] of DEMO_PEOPLE.entries()) {
    const passwordHash = hashes[index] ?? null;
    ids.push(await insertPerson(tx, { name, email, roles, passwordHash, now }));
  }
  const idsOf = (fits: (person: (typeof DEMO_PEOPLE)[number]) => boolean): number[] =>
    ids.filter((_, index) => {
      const person = DEMO_PEOPLE[index];
      return person !== undefined && fits(person);
    });

  const desks = new Map<DeskName, LaidOutDesk>();
  for (const deskName of DESK_NAMES) {
    const deskId = await insertDesk(tx, { name: deskName, headId: null });
    for (const id of idsOf(({ desk }) => desk === deskName)) await addDeskMember(tx, deskId, id);
    const [headId] = idsOf(({ desk, isHead }) => desk === deskName && isHead === true);
    const [analystId] = idsOf(({ desk, roles }) => desk === deskName && roles.includes('analyst'));
    if (headId === undefined || analystId === undefined)
      throw new Error(`${deskName} has no head or no analyst`);
    await setDeskHead(tx, deskId, headId);
    const managerIds = idsOf(
      ({ desk, roles }) => desk === deskName && roles.includes('relationship manager'),
    );
    desks.set(deskName, { deskId, analystId, managerIds });
  }
  const committeeIds = idsOf(({ roles }) => roles.includes('committee member'));
  await setLenderContacts(tx, { headOfCreditId: committeeIds[0] ?? null, legalContactId: null });
  return { desks, committeeIds };
}
