/**
 * How each route is asked in the matrix: for the things of one desk, in a way that changes nothing. A write carries
 * a version that is long past, or what the rules refuse, so that the answer for somebody who may is known and the
 * thing stays as it is.
 *
 * A route that is not here fails the matrix.
 */
import type { Action, Role } from '../../src/server/auth/policy.ts';
import type { DeskThings } from '../support/twoDesks.ts';
import type { Sending } from '../support/client.ts';

export interface Sample {
  /** The right that the route is meant to need, written out by hand: held against what the route itself declares. */
  readonly can: Action | 'signed in' | 'anyone';
  readonly path: (desk: DeskThings) => string;
  readonly sending?: (desk: DeskThings) => Sending;
  /** Status for somebody who may, with the things of a desk in reach. */
  readonly may: number;
  /** The thing is named in the address or the body, so that another desk's is "not found". */
  readonly names: 'a thing' | 'nothing';
  /** Of those who may, only this one stands in the needed relation to the thing; the others are told so with 403. */
  readonly onlyFor?: Role;
}

/** No thing is at this version after being made: the answer is 412 and nothing is changed. */
const LONG_PAST = { 'if-match': '"4000000"' };

const get = (can: Sample['can'], path: Sample['path'], names: Sample['names'] = 'a thing'): Sample => ({
  can,
  path,
  may: 200,
  names,
});

const list = (can: Sample['can'], path: string): Sample => get(can, () => path, 'nothing');

const post = (
  can: Sample['can'],
  path: Sample['path'],
  json: unknown,
  may: number,
  names: Sample['names'] = 'a thing',
): Sample => ({ can, path, sending: () => ({ method: 'POST', json, headers: LONG_PAST }), may, names });

const postEmpty = (can: Sample['can'], path: Sample['path'], may: number): Sample => ({
  can,
  path,
  sending: () => ({ method: 'POST', headers: LONG_PAST }),
  may,
  names: 'a thing',
});

const TEXT = 'A text of the tests, long enough to be one.';

/** By method and route file under src/pages/api/v1, without its ending. */
export const MATRIX: Readonly<Record<string, Sample>> = {
  'POST account/digest': post('signed in', () => '/account/digest', {}, 422, 'nothing'),
  'POST scheme': post('signed in', () => '/scheme', { scheme: 'neither' }, 422, 'nothing'),
  'POST password/index': post('signed in', () => '/password', {}, 422, 'nothing'),
  'POST password/forgot': post('anyone', () => '/password/forgot', {}, 422, 'nothing'),
  'POST password/reset': post('anyone', () => '/password/reset', {}, 422, 'nothing'),
  'POST session/index': post('anyone', () => '/session', {}, 422, 'nothing'),
  'POST session/end': post('signed in', () => '/session/end', 'not an object', 422, 'nothing'),
  'POST session/end-others': post('signed in', () => '/session/end-others', 'not an object', 422, 'nothing'),
  'POST set-up': post('anyone', () => '/set-up', {}, 422, 'nothing'),
  'POST unsubscribe': post('anyone', () => '/unsubscribe', { token: 'short' }, 422, 'nothing'),

  'GET audit-log/index': list('read the audit log', '/audit-log'),
  'GET audit-log/check': list('read the audit log', '/audit-log/check'),

  'GET borrowers/index': list('read borrower', '/borrowers'),
  'GET borrowers/[id]/index': get('read borrower', (desk) => `/borrowers/${desk.borrower}`),
  'GET borrowers/[id]/covenants/[covenantId]/tests/[testDate]': get(
    'read borrower',
    (desk) => `/borrowers/${desk.borrower}/covenants/${desk.covenant}/tests/2026-09-30`,
  ),
  'GET borrowers/[id]/review-sheet': get(
    'read borrower',
    (desk) => `/borrowers/${desk.borrower}/review-sheet`,
  ),
  'GET borrowers/[id]/statements': get('read borrower', (desk) => `/borrowers/${desk.borrower}/statements`),
  'GET statements/[id]/cells/[line]': get(
    'read borrower',
    (desk) => `/statements/${desk.statement}/cells/revenue`,
  ),

  'GET alerts/index': list('read borrower', '/alerts'),
  'GET alerts/[id]/index': get('read borrower', (desk) => `/alerts/${desk.alert}`),
  'POST alerts/[id]/steps': post(
    'work an alert',
    (desk) => `/alerts/${desk.alert}/steps`,
    { step: 'assess', text: TEXT },
    412,
  ),
  'POST alerts/[id]/handing-over': post(
    'hand over an alert',
    (desk) => `/alerts/${desk.alertWaitingForAnalyst}/handing-over`,
    { text: TEXT },
    412,
  ),
  'POST alerts/[id]/closing': post(
    'confirm a closing',
    (desk) => `/alerts/${desk.alertToConfirm}/closing`,
    { confirm: true, text: TEXT },
    412,
  ),

  'GET runs/index': list('administer', '/runs'),
  'POST runs/index': post('administer', () => '/runs', { businessDate: 'no day' }, 422, 'nothing'),
  // Runs belong to no desk: the one of the tests is not there for anybody who may ask.
  'GET runs/[id]': { ...get('administer', () => '/runs/999999999999', 'nothing'), may: 404 },

  'GET book/index': list('read borrower', '/book'),

  'GET policy/index': list('signed in', '/policy'),
  // Version 4,000,000 has not been: nothing is proposed.
  'POST policy/proposals/index': post(
    'propose policy',
    () => '/policy/proposals',
    { from: 4_000_000, validFrom: '2035-01-31', reason: TEXT, values: { qualityWeakBelow: '25' } },
    412,
    'nothing',
  ),
  // The policy belongs to no desk: the proposal of the tests is not there for anybody who may ask.
  'POST policy/proposals/[id]/decision': post(
    'confirm policy',
    () => '/policy/proposals/999999999999/decision',
    { decision: 'decline', text: TEXT },
    404,
    'nothing',
  ),
  'POST policy/proposals/[id]/withdrawal': {
    ...postEmpty('propose policy', () => '/policy/proposals/999999999999/withdrawal', 404),
    names: 'nothing',
  },

  'GET watchlist/index': list('read borrower', '/watchlist'),
  'POST proposals/index': {
    can: 'propose',
    path: () => '/proposals',
    sending: (desk) => ({
      json: {
        borrowerId: desk.borrower,
        alertId: null,
        change: 'entry',
        grade: 'W1',
        reason: TEXT,
        ownerId: desk.manager.id,
        plan: TEXT,
        nextReviewOn: '2035-01-31',
      },
    }),
    // One proposal for the borrower waits already.
    may: 409,
    names: 'a thing',
  },
  'POST proposals/[id]/withdrawal': {
    ...postEmpty('propose', (desk) => `/proposals/${desk.proposal}/withdrawal`, 412),
    onlyFor: 'analyst',
  },
  'POST proposals/[id]/decision': post(
    'decide',
    (desk) => `/proposals/${desk.proposal}/decision`,
    { decision: 'decline', text: TEXT },
    412,
  ),

  'GET imports/index': list('read borrower', '/imports'),
  'POST imports/index': {
    can: 'import figures',
    path: () => '/imports',
    sending: (desk) => ({ form: emptyUpload(desk.borrower) }),
    may: 422,
    names: 'a thing',
  },
  'GET imports/[id]/index': get('read borrower', (desk) => `/imports/${desk.import}`),
  'POST imports/[id]/withdrawal': postEmpty(
    'import figures',
    (desk) => `/imports/${desk.import}/withdrawal`,
    412,
  ),
  'POST imports/[id]/answers': post(
    'import figures',
    (desk) => `/imports/${desk.import}/answers`,
    { questionKey: 'unit', answer: '1000' },
    412,
  ),
  'POST imports/[id]/acceptance': post(
    'import figures',
    (desk) => `/imports/${desk.import}/acceptance`,
    { basis: 'management', scope: 'group' },
    412,
  ),
};

function emptyUpload(borrower: number): FormData {
  const form = new FormData();
  form.set('borrowerId', String(borrower));
  form.set('file', new File(['not a workbook'], 'figures.xlsx'));
  return form;
}
