import type { Migration } from "./migration.ts";

/** Surveys, their stewards and grants, releases, and the imports that fill them. */
export const holdings: Migration = {
  name: "0002-holdings",
  up: [
    `CREATE TABLE surveys (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      title VARCHAR(160) NOT NULL,
      description TEXT NOT NULL,
      created_at DATETIME(3) NOT NULL,
      CHECK (title <> '')
    )`,
    `CREATE TABLE survey_stewards (
      survey_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      person_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      PRIMARY KEY (survey_id, person_id),
      FOREIGN KEY (survey_id) REFERENCES surveys (id) ON DELETE CASCADE,
      FOREIGN KEY (person_id) REFERENCES people (id)
    )`,
    `CREATE TABLE grants (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      survey_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      person_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      purpose VARCHAR(1000) NOT NULL,
      ends_on DATE NOT NULL,
      given_by CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      given_at DATETIME(3) NOT NULL,
      revoked_by CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      revoked_at DATETIME(3) NULL,
      INDEX (person_id, survey_id),
      FOREIGN KEY (survey_id) REFERENCES surveys (id) ON DELETE CASCADE,
      FOREIGN KEY (person_id) REFERENCES people (id),
      FOREIGN KEY (given_by) REFERENCES people (id),
      FOREIGN KEY (revoked_by) REFERENCES people (id),
      CHECK (purpose <> ''), CHECK ((revoked_by IS NULL) = (revoked_at IS NULL))
    )`,
    `CREATE TABLE releases (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      survey_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      wave VARCHAR(60) NOT NULL,
      status VARCHAR(12) NOT NULL DEFAULT 'draft',
      respondents INT UNSIGNED NOT NULL,
      checksum CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      design JSON NULL,
      layout_at DATETIME(3) NULL,
      created_by CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      created_at DATETIME(3) NOT NULL,
      published_by CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      published_at DATETIME(3) NULL,
      version INT UNSIGNED NOT NULL DEFAULT 0,
      INDEX (survey_id, wave),
      FOREIGN KEY (survey_id) REFERENCES surveys (id),
      FOREIGN KEY (created_by) REFERENCES people (id),
      FOREIGN KEY (published_by) REFERENCES people (id),
      CHECK (status IN ('draft', 'published', 'superseded', 'withdrawn')),
      CHECK (status = 'draft' OR (published_at IS NOT NULL AND design IS NOT NULL))
    )`,
    `CREATE TABLE imports (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      survey_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      release_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      wave VARCHAR(60) NOT NULL,
      status VARCHAR(12) NOT NULL,
      stage VARCHAR(120) NOT NULL,
      bytes_done BIGINT UNSIGNED NOT NULL DEFAULT 0,
      bytes_total BIGINT UNSIGNED NOT NULL DEFAULT 0,
      row_count INT UNSIGNED NOT NULL DEFAULT 0,
      problems JSON NOT NULL,
      is_cancel_asked BOOLEAN NOT NULL DEFAULT FALSE,
      started_by CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      started_at DATETIME(3) NOT NULL,
      heartbeat_at DATETIME(3) NOT NULL,
      ended_at DATETIME(3) NULL,
      INDEX (survey_id, started_at), INDEX (status),
      FOREIGN KEY (survey_id) REFERENCES surveys (id),
      FOREIGN KEY (release_id) REFERENCES releases (id) ON DELETE SET NULL,
      FOREIGN KEY (started_by) REFERENCES people (id),
      CHECK (status IN ('queued', 'running', 'done', 'failed', 'cancelled'))
    )`,
  ],
  down: ["imports", "releases", "grants", "survey_stewards", "surveys"].map((table) => `DROP TABLE ${table}`),
};
