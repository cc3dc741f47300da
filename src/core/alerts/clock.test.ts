import { expect, test } from 'vitest';
import { alertDue } from './clock.ts';

// Weekdays counted by hand from Tuesday 1 December 2026; 5, 6, 12, 13, 19, 20, 26 and 27 December are weekends.
test('a test not met is to be verified in 2 and decided in 5 business days', () => {
  expect(alertDue('test not met', 'urgent', '2026-12-01')).toEqual({
    assessBy: '2026-12-03',
    decideBy: '2026-12-08',
  });
});

test('any other urgent alert has 3 and 10 business days, soon 10 and 20, a note 20', () => {
  expect(alertDue('thin headroom', 'urgent', '2026-12-01')).toEqual({
    assessBy: '2026-12-04',
    decideBy: '2026-12-15',
  });
  expect(alertDue('thin headroom', 'soon', '2026-12-01')).toEqual({
    assessBy: '2026-12-15',
    decideBy: '2026-12-29',
  });
  expect(alertDue('just passing, repeated', 'note', '2026-12-01')).toEqual({
    assessBy: null,
    decideBy: '2026-12-29',
  });
});
