import type { Migration } from '../migration.ts';

/** A version of the policy points to the proposal that two persons made and decided. */
export const migration: Migration = {
  name: '0007-policy',
  up: [
    'alter table policies add column if not exists proposal_id bigint unsigned null',
    'alter table policies add key if not exists policies_proposal (proposal_id)',
    'alter table policies add key if not exists policies_proposer (proposed_by)',
    'alter table policies add key if not exists policies_confirmer (confirmed_by)',
    `alter table policies add constraint policies_proposal
      foreign key if not exists (proposal_id) references proposals (id)`,
    `alter table policies add constraint policies_proposer
      foreign key if not exists (proposed_by) references people (id)`,
    `alter table policies add constraint policies_confirmer
      foreign key if not exists (confirmed_by) references people (id)`,
  ],
  down: [
    'alter table if exists policies drop foreign key if exists policies_proposal',
    'alter table if exists policies drop foreign key if exists policies_proposer',
    'alter table if exists policies drop foreign key if exists policies_confirmer',
    'alter table if exists policies drop key if exists policies_proposal',
    'alter table if exists policies drop key if exists policies_proposer',
    'alter table if exists policies drop key if exists policies_confirmer',
    'alter table if exists policies drop column if exists proposal_id',
  ],
};
