/** Keys the audit chain of the test run's databases. */
export const AUDIT_KEY = 'key-of-the-test-run-0123456789abcdefgh';
