import type { Migration } from "./migration.ts";

/** Variables with their categories, and the columns of microdata in segments. */
export const microdata: Migration = {
  name: "0003-microdata",
  up: [
    `CREATE TABLE variables (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
      release_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      position INT UNSIGNED NOT NULL,
      name VARCHAR(64) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
      label VARCHAR(400) NOT NULL,
      kind VARCHAR(12) NOT NULL,
      storage VARCHAR(12) NOT NULL,
      missing_rows INT UNSIGNED NOT NULL,
      distinct_values INT UNSIGNED NOT NULL,
      minimum DOUBLE NULL,
      maximum DOUBLE NULL,
      is_whole BOOLEAN NOT NULL,
      UNIQUE (release_id, name), UNIQUE (release_id, position),
      FOREIGN KEY (release_id) REFERENCES releases (id) ON DELETE CASCADE,
      CHECK (kind IN ('categorical', 'numeric', 'text')),
      CHECK (storage IN ('code', 'number', 'text'))
    )`,
    `CREATE TABLE categories (
      variable_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      position INT UNSIGNED NOT NULL,
      code VARCHAR(200) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
      label VARCHAR(400) NOT NULL,
      is_missing BOOLEAN NOT NULL,
      respondents INT UNSIGNED NOT NULL,
      PRIMARY KEY (variable_id, position), UNIQUE (variable_id, code),
      FOREIGN KEY (variable_id) REFERENCES variables (id) ON DELETE CASCADE
    )`,
    `CREATE TABLE column_segments (
      variable_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      segment INT UNSIGNED NOT NULL,
      encoding VARCHAR(12) NOT NULL,
      row_count INT UNSIGNED NOT NULL,
      bytes LONGBLOB NOT NULL,
      checksum CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      PRIMARY KEY (variable_id, segment),
      FOREIGN KEY (variable_id) REFERENCES variables (id) ON DELETE CASCADE,
      CHECK (row_count BETWEEN 1 AND 65536)
    )`,
    `CREATE TABLE layouts (
      release_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      part VARCHAR(20) NOT NULL,
      bytes LONGBLOB NOT NULL,
      checksum CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      PRIMARY KEY (release_id, part),
      FOREIGN KEY (release_id) REFERENCES releases (id) ON DELETE CASCADE
    )`,
  ],
  down: ["layouts", "column_segments", "categories", "variables"].map((table) => `DROP TABLE ${table}`),
};
