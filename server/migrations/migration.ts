/**
 * One change of the tables, as SQL statements in order. MariaDB commits each by itself, so a file holds statements
 * that make sense one by one. Migrations import nothing of ours: they must read the same in years to come.
 */
export interface Migration {
  name: string;
  up: readonly string[];
  down: readonly string[];
}
