import type { Migration } from '../migration.ts';

/** Lender, desks, people and what signing in needs. */
export const migration: Migration = {
  name: '0001-people',
  up: [
    `create table if not exists lenders (
      id tinyint unsigned not null primary key,
      name varchar(200) not null,
      zone varchar(64) not null,
      night_at_utc char(5) not null,
      head_of_credit_id bigint unsigned null,
      legal_contact_id bigint unsigned null,
      seeded_on date null,
      version int unsigned not null default 1
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists people (
      id bigint unsigned not null auto_increment primary key,
      email varchar(254) not null,
      name varchar(200) not null,
      password_hash varchar(200) null,
      is_active tinyint(1) not null default 1,
      wants_digest tinyint(1) not null default 1,
      unsubscribe_token_hash char(64) null,
      created_at datetime(3) not null,
      version int unsigned not null default 1,
      unique key people_email (email),
      unique key people_unsubscribe (unsubscribe_token_hash)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists person_roles (
      person_id bigint unsigned not null,
      role varchar(32) not null,
      primary key (person_id, role),
      constraint person_roles_person foreign key (person_id) references people (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists desks (
      id bigint unsigned not null auto_increment primary key,
      name varchar(120) not null,
      head_id bigint unsigned null,
      version int unsigned not null default 1,
      unique key desks_name (name),
      key desks_head (head_id),
      constraint desks_head foreign key (head_id) references people (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists desk_changes (
      desk_id bigint unsigned not null primary key,
      change_number bigint unsigned not null default 0,
      constraint desk_changes_desk foreign key (desk_id) references desks (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists desk_members (
      desk_id bigint unsigned not null,
      person_id bigint unsigned not null,
      primary key (desk_id, person_id),
      key desk_members_person (person_id),
      constraint desk_members_desk foreign key (desk_id) references desks (id),
      constraint desk_members_person foreign key (person_id) references people (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists deputies (
      id bigint unsigned not null auto_increment primary key,
      person_id bigint unsigned not null,
      deputy_id bigint unsigned not null,
      from_date date not null,
      until_date date not null,
      version int unsigned not null default 1,
      key deputies_person (person_id),
      key deputies_deputy (deputy_id),
      constraint deputies_person foreign key (person_id) references people (id),
      constraint deputies_deputy foreign key (deputy_id) references people (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists sessions (
      id char(64) not null primary key,
      person_id bigint unsigned not null,
      created_at datetime(3) not null,
      last_seen_at datetime(3) not null,
      expires_at datetime(3) not null,
      key sessions_person (person_id),
      key sessions_expiry (expires_at),
      constraint sessions_person foreign key (person_id) references people (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists one_time_tokens (
      token_hash char(64) not null primary key,
      purpose varchar(32) not null,
      person_id bigint unsigned null,
      expires_at datetime(3) not null,
      used_at datetime(3) null,
      key one_time_tokens_person (person_id),
      constraint one_time_tokens_person foreign key (person_id) references people (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists rate_limits (
      \`key\` varchar(255) not null primary key,
      points int not null default 0,
      expire bigint unsigned null,
      key rate_limits_end (expire)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_bin`,
    `create table if not exists idempotency_keys (
      person_id bigint unsigned not null,
      \`key\` varchar(100) not null,
      route varchar(200) not null,
      body_hash char(64) not null,
      status smallint unsigned null,
      response mediumtext null,
      created_at datetime(3) not null,
      primary key (person_id, \`key\`)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_bin`,
  ],
  down: [
    'drop table if exists idempotency_keys',
    'drop table if exists rate_limits',
    'drop table if exists one_time_tokens',
    'drop table if exists sessions',
    'drop table if exists deputies',
    'drop table if exists desk_members',
    'drop table if exists desk_changes',
    'drop table if exists desks',
    'drop table if exists person_roles',
    'drop table if exists people',
    'drop table if exists lenders',
  ],
};
