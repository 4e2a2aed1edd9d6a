import type { Migration } from "./migration.ts";

/** What was done, by whom, when. Rows outlive what they speak of, so there are no foreign keys. */
export const ledger: Migration = {
  name: "0004-ledger",
  up: [
    `CREATE TABLE ledger (
      id BIGINT UNSIGNED AUTO_INCREMENT PRIMARY KEY,
      at DATETIME(3) NOT NULL,
      actor_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      actor_name VARCHAR(120) NULL,
      action VARCHAR(40) NOT NULL,
      survey_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      subject_id VARCHAR(64) NULL,
      summary VARCHAR(2000) NOT NULL,
      INDEX (survey_id, id), INDEX (actor_id, id), INDEX (action, id)
    )`,
  ],
  down: ["DROP TABLE ledger"],
};
