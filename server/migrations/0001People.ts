import type { Migration } from "./migration.ts";

/** People, what they may be, their one-time links and their sessions. */
export const people: Migration = {
  name: "0001-people",
  up: [
    `CREATE TABLE people (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      name VARCHAR(120) NOT NULL,
      email VARCHAR(254) NOT NULL UNIQUE,
      password_hash VARCHAR(255) NULL,
      is_active BOOLEAN NOT NULL DEFAULT TRUE,
      last_sign_in_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      CHECK (name <> ''), CHECK (email LIKE '%_@_%')
    )`,
    `CREATE TABLE person_roles (
      person_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      role VARCHAR(20) NOT NULL,
      PRIMARY KEY (person_id, role),
      FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE CASCADE,
      CHECK (role IN ('steward', 'epidemiologist', 'planner', 'administrator'))
    )`,
    `CREATE TABLE sign_in_links (
      token_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      person_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
      expires_at DATETIME(3) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE CASCADE
    )`,
    `CREATE TABLE sessions (
      sid VARCHAR(128) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      expires DATETIME(3) NULL,
      data TEXT NULL,
      person_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      INDEX (expires), INDEX (person_id)
    )`,
  ],
  down: ["DROP TABLE sessions", "DROP TABLE sign_in_links", "DROP TABLE person_roles", "DROP TABLE people"],
};
