import type { Migration } from '../migration.ts';

/**
 * Every change, in one chain. The application's database user may insert and read these rows, not change them;
 * the sequence number and the head of the chain live in a counter row that is locked for each append.
 */
export const migration: Migration = {
  name: '0002-audit',
  up: [
    `create table if not exists audit_heads (
      id tinyint unsigned not null primary key,
      seq bigint unsigned not null,
      hash char(64) not null
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_bin`,
    `insert ignore into audit_heads (id, seq, hash) values (1, 0, repeat('0', 64))`,
    `create table if not exists audit_entries (
      seq bigint unsigned not null primary key,
      at datetime(3) not null,
      person_id bigint unsigned null,
      person_name varchar(200) not null,
      action varchar(64) not null,
      subject_kind varchar(40) not null,
      subject_id varchar(80) not null,
      borrower_id bigint unsigned null,
      desk_id bigint unsigned null,
      summary varchar(500) not null,
      before_json mediumtext null,
      after_json mediumtext null,
      request_id varchar(64) not null,
      address varchar(64) not null,
      previous_hash char(64) not null,
      hash char(64) not null,
      key audit_at (at, seq),
      key audit_person (person_id, seq),
      key audit_borrower (borrower_id, seq),
      key audit_subject (subject_kind, subject_id, seq)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
  ],
  down: ['drop table if exists audit_entries', 'drop table if exists audit_heads'],
};
