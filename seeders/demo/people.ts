/** The people of the invented lender. Names of nobody; addresses in a domain that no mail leaves for. */
import type { Role } from '../../src/server/auth/policy.ts';
import type { DeskName } from './borrowerTable.ts';

export const LENDER_NAME = 'Lodenquay Credit';
export const LENDER_ZONE = 'Europe/Paris';
export const NIGHT_AT_UTC = '01:30';

/** One for all: a demo desk has nothing to hide. */
export const DEMO_PASSWORD = 'plimsoll-lantern-27-fathoms';

interface DemoPerson {
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
  readonly desk: DeskName | null;
  /** What the list of sign-ins says. */
  readonly part: string;
  readonly isHead?: true;
}

export const DEMO_PEOPLE: readonly DemoPerson[] = [
  {
    name: 'Ilka Brandsoe',
    email: 'ilka.brandsoe@lender.example',
    roles: ['analyst'],
    desk: 'Northern desk',
    part: 'analyst, Northern desk',
  },
  {
    name: 'Maren Holtqvane',
    email: 'maren.holtqvane@lender.example',
    roles: ['relationship manager'],
    desk: 'Northern desk',
    part: 'head of Northern desk',
    isHead: true,
  },
  {
    name: 'Piers Wexcombe',
    email: 'piers.wexcombe@lender.example',
    roles: ['relationship manager'],
    desk: 'Northern desk',
    part: 'relationship manager, Northern desk',
  },
  {
    name: 'Jonna Tervikke',
    email: 'jonna.tervikke@lender.example',
    roles: ['analyst'],
    desk: 'Harbour desk',
    part: 'analyst, Harbour desk',
  },
  {
    name: 'Ruben Astrelle',
    email: 'ruben.astrelle@lender.example',
    roles: ['relationship manager'],
    desk: 'Harbour desk',
    part: 'head of Harbour desk',
    isHead: true,
  },
  {
    name: 'Agneta Lornby',
    email: 'agneta.lornby@lender.example',
    roles: ['committee member'],
    desk: null,
    part: 'committee member, head of credit',
  },
  {
    name: 'Cedric Valmoore',
    email: 'cedric.valmoore@lender.example',
    roles: ['committee member'],
    desk: null,
    part: 'committee member',
  },
  {
    name: 'Bram Oostrick',
    email: 'bram.oostrick@lender.example',
    roles: ['administrator'],
    desk: null,
    part: 'administrator',
  },
  {
    name: 'Hester Quillane',
    email: 'hester.quillane@lender.example',
    roles: ['auditor'],
    desk: null,
    part: 'auditor',
  },
];
