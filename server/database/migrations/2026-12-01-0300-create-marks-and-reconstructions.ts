import { run } from '../connection';
import { appendOnly, hash, refuseChanges, uuid, type Migration } from './migration';

/** Labels and names of traces: "T1" and "t1" are two. */
const name = 'VARCHAR(40) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin';

const tables = [
  `CREATE TABLE survey_imports (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     file_id ${uuid} NOT NULL,
     exhibit_number VARCHAR(40) NOT NULL,
     file_name VARCHAR(400) NOT NULL,
     mapping LONGTEXT NOT NULL,
     rejected LONGTEXT NOT NULL,
     accepted INT NOT NULL,
     imported_by ${uuid} NOT NULL,
     imported_at DATETIME(6) NOT NULL,
     KEY survey_imports_case (case_id),
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (imported_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB`,
  `CREATE TABLE marks (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     label ${name} NOT NULL,
     kind VARCHAR(24) NOT NULL,
     x DOUBLE NOT NULL,
     y DOUBLE NOT NULL,
     var_x DOUBLE NOT NULL,
     cov_xy DOUBLE NOT NULL,
     var_y DOUBLE NOT NULL,
     height DOUBLE NULL,
     trace ${name} NULL,
     place INT NULL,
     note VARCHAR(1000) NOT NULL,
     source LONGTEXT NOT NULL,
     version INT NOT NULL DEFAULT 1,
     removed_at DATETIME(6) NULL,
     -- Labels are unique among the marks that stand; a withdrawn one frees its label.
     standing_label ${name} AS (IF(removed_at IS NULL, label, NULL)) PERSISTENT,
     UNIQUE KEY marks_label (case_id, standing_label),
     FOREIGN KEY (case_id) REFERENCES cases (id)
   ) ENGINE=InnoDB`,
  // What a mark was before each change, who changed it and why.
  `CREATE TABLE mark_history (
     id ${uuid} PRIMARY KEY,
     mark_id ${uuid} NOT NULL,
     case_id ${uuid} NOT NULL,
     version INT NOT NULL,
     before_change LONGTEXT NOT NULL,
     reason VARCHAR(1000) NOT NULL,
     changed_by ${uuid} NOT NULL,
     changed_at DATETIME(6) NOT NULL,
     UNIQUE KEY mark_history_version (mark_id, version),
     FOREIGN KEY (mark_id) REFERENCES marks (id),
     FOREIGN KEY (changed_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  `CREATE TABLE reconstructions (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     name VARCHAR(120) NOT NULL,
     assumption VARCHAR(1000) NOT NULL,
     document LONGTEXT NOT NULL,
     version INT NOT NULL DEFAULT 1,
     changed_by ${uuid} NOT NULL,
     changed_at DATETIME(6) NOT NULL,
     KEY reconstructions_case (case_id),
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (changed_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB`,
  // The document is the exact canonical text whose SHA-256 is the address.
  `CREATE TABLE computations (
     case_id ${uuid} NOT NULL,
     hash ${hash} NOT NULL,
     sequence INT NOT NULL,
     kind VARCHAR(40) NOT NULL,
     reconstruction_id ${uuid} NOT NULL,
     reconstruction_name VARCHAR(120) NOT NULL,
     station_id VARCHAR(40) NOT NULL,
     station_name VARCHAR(80) NOT NULL,
     status VARCHAR(24) NOT NULL,
     document LONGTEXT NOT NULL,
     recorded_by ${uuid} NOT NULL,
     recorded_at DATETIME(6) NOT NULL,
     PRIMARY KEY (case_id, hash),
     UNIQUE KEY computations_sequence (case_id, sequence),
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (recorded_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  ...refuseChanges('mark_history'),
  ...refuseChanges('computations'),
];

export const createMarksAndReconstructions: Migration = {
  name: '2026-12-01-0300-create-marks-and-reconstructions',
  async up(sequelize) {
    for (const statement of tables) await run(sequelize, statement);
  },
  async down(sequelize) {
    for (const table of [
      'computations',
      'reconstructions',
      'mark_history',
      'marks',
      'survey_imports',
    ]) {
      await run(sequelize, `DROP TABLE ${table}`);
    }
  },
};
