/**
 * First import of every test that speaks to the database: points the application's settings at the test run's
 * database before anything reads them.
 */
import { inject } from 'vitest';
import { AUDIT_KEY } from './auditKey.ts';

process.env['DATABASE_URL'] = inject('databaseUrl');
process.env['DATABASE_OWNER_URL'] = inject('databaseOwnerUrl');
process.env['AUDIT_KEY'] = AUDIT_KEY;
process.env['LOG_LEVEL'] = 'silent';
