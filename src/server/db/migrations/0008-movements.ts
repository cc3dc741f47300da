import type { Migration } from '../migration.ts';

/** Why a result is another than the night before, computed once and kept with it. */
export const migration: Migration = {
  name: '0008-movements',
  up: [
    `alter table assessments
      add column if not exists earlier_assessment_id bigint unsigned null,
      add column if not exists movements mediumtext null`,
  ],
  down: [
    'alter table assessments drop column if exists movements, drop column if exists earlier_assessment_id',
  ],
};
