import { describe, expect, test } from 'vitest';
import { ALERT_EVENTS } from '../db/repositories/alerts.ts';
import type { DigestAlert } from '../db/repositories/digestAlerts.ts';
import { askedOf, digestBlocks, type DigestDay } from './digestBlocks.ts';

const alert = (facts: Partial<DigestAlert> = {}): DigestAlert => ({
  id: 1,
  borrowerId: 3,
  borrowerName: 'Marrowby',
  deskId: 1,
  deskName: 'Northern desk',
  deskHeadId: null,
  ownerId: 9,
  kind: 'thin headroom',
  severity: 'soon',
  state: 'taken',
  isOpen: true,
  conditionGone: false,
  sentence: 'Net leverage 3.38x, at most 3.50x.',
  factDate: '2026-09-30',
  dueOn: '2026-12-29',
  events: [],
  ...facts,
});

const day: DigestDay = { businessDate: '2026-12-01', since: '2026-11-30', tellsDueDates: true };
const blockOf = (facts: Partial<DigestAlert>, on: Partial<DigestDay> = {}) => {
  const { blocks } = digestBlocks([alert(facts)], { ...day, ...on });
  return [...blocks].find(([, alerts]) => alerts.length > 0)?.[0] ?? null;
};

describe('an open alert', () => {
  test('without a change is not repeated, only counted', () => {
    expect(blockOf({})).toBeNull();
    expect(digestBlocks([alert(), alert({ id: 2 })], day)).toMatchObject({ unchanged: 2, newFigures: 0 });
  });

  test('that was raised is new, also where it worsened the same night or is due today', () => {
    expect(blockOf({ events: [ALERT_EVENTS.raised] })).toBe('New');
    expect(blockOf({ events: [ALERT_EVENTS.raised, ALERT_EVENTS.worsened], dueOn: '2026-12-01' })).toBe(
      'New',
    );
  });

  test('that worsened, or whose condition is back, is worse', () => {
    expect(blockOf({ events: [ALERT_EVENTS.worsened] })).toBe('Worse');
    expect(blockOf({ events: [ALERT_EVENTS.back] })).toBe('Worse');
  });

  test('that improved, or whose condition is gone, is improved', () => {
    expect(blockOf({ events: [ALERT_EVENTS.improved] })).toBe('Improved');
    expect(blockOf({ events: [ALERT_EVENTS.gone], conditionGone: true, severity: 'urgent' })).toBe(
      'Improved',
    );
  });

  test('with new figures of the same severity is a count', () => {
    expect(blockOf({ events: [ALERT_EVENTS['new facts']] })).toBeNull();
    expect(digestBlocks([alert({ events: [ALERT_EVENTS['new facts']] })], day).newFigures).toBe(1);
  });

  test.each([
    ['2026-12-02', null],
    ['2026-12-01', 'Due today'],
    ['2026-11-30', 'Overdue'],
    ['2026-11-29', null],
  ] as const)('due on %s is in block %s', (dueOn, block) => {
    expect(blockOf({ dueOn })).toBe(block);
  });

  test('overdue since before the last digest is a count', () => {
    expect(digestBlocks([alert({ dueOn: '2026-11-29' })], day)).toMatchObject({
      stillOverdue: 1,
      unchanged: 1,
    });
    expect(blockOf({ dueOn: '2026-11-29' }, { since: null })).toBe('Overdue');
  });

  test('is not asked for while it is put off', () => {
    expect(blockOf({ state: 'put off', dueOn: '2026-12-01' })).toBeNull();
    expect(blockOf({ state: 'put off', dueOn: '2026-11-30' })).toBeNull();
  });

  test('is not told due twice: a second attempt of the date leaves due dates out', () => {
    expect(blockOf({ dueOn: '2026-12-01' }, { tellsDueDates: false })).toBeNull();
    expect(blockOf({ dueOn: '2026-11-30' }, { tellsDueDates: false })).toBeNull();
  });
});

describe('a closed alert', () => {
  const closed = { isOpen: false, state: 'closed' } as const;
  test('that closed by itself is improved, unless nobody ever heard of it', () => {
    expect(blockOf({ ...closed, events: [ALERT_EVENTS.closed] })).toBe('Improved');
    expect(blockOf({ ...closed, events: [ALERT_EVENTS.raised, ALERT_EVENTS.closed] })).toBeNull();
  });

  test('that a person closed is neither told nor counted', () => {
    expect(digestBlocks([alert({ ...closed, events: [ALERT_EVENTS.worsened] })], day)).toMatchObject({
      unchanged: 0,
    });
    expect(blockOf({ ...closed, events: [ALERT_EVENTS.worsened] })).toBeNull();
  });
});

describe('what is asked', () => {
  test('of a raised alert: take it, assess it, decide it, each by its day', () => {
    expect(askedOf(alert({ state: 'raised' }), '2026-12-01')).toBe(
      'Take it, assess by 15 Dec 2026, decide by 29 Dec 2026.',
    );
  });

  test('names no day for the assessment that comes after the decision', () => {
    expect(askedOf(alert({ state: 'raised', dueOn: '2026-12-04' }), '2026-12-01')).toBe(
      'Take it, assess it, decide by 4 Dec 2026.',
    );
  });

  test('says where today is the day and where it has passed', () => {
    expect(askedOf(alert({ dueOn: '2026-12-01' }), '2026-12-01')).toBe('Assess it and decide today.');
    expect(askedOf(alert({ dueOn: '2026-11-30' }), '2026-12-01')).toBe(
      'Assess it and decide; it was due on 30 Nov 2026.',
    );
  });

  test('of an alert whose condition is gone: a person confirms; of one that closed by itself: nothing', () => {
    expect(askedOf(alert({ conditionGone: true, severity: 'urgent' }), '2026-12-01')).toContain('Confirm');
    expect(askedOf(alert({ isOpen: false, state: 'closed' }), '2026-12-01')).toContain('Nothing');
  });
});
