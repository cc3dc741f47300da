import type { Migration } from '../migration.ts';

/**
 * What a night found over the whole book: one row of what is said of it, and one row for each of its parts, by type
 * of covenant and by sector. Empty text is every type, every sector. Computed once, read by the page of the book.
 */
export const migration: Migration = {
  name: '0009-book-patterns',
  up: [
    `create table if not exists book_standings (
      cross_section_id bigint unsigned not null primary key,
      content longtext compressed not null,
      constraint book_standings_cross_section foreign key (cross_section_id) references cross_sections (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
    `create table if not exists book_patterns (
      cross_section_id bigint unsigned not null,
      measure varchar(40) not null,
      sector varchar(16) not null,
      content longtext compressed not null,
      primary key (cross_section_id, measure, sector),
      constraint book_patterns_cross_section foreign key (cross_section_id) references cross_sections (id)
    ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_unicode_ci`,
  ],
  down: ['drop table if exists book_patterns', 'drop table if exists book_standings'],
};
