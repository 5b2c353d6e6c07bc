import { run } from '../connection';
import { appendOnly, hash, refuseChanges, uuid, type Migration } from './migration';

const number = 'VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin';

const tables = [
  // What was registered, and, repeated from the ledger for reading and locking, where the item is now.
  `CREATE TABLE exhibits (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     ordinal INT NOT NULL,
     number ${number} NOT NULL,
     kind VARCHAR(24) NOT NULL,
     description VARCHAR(1000) NOT NULL,
     source VARCHAR(1000) NOT NULL,
     collected_by VARCHAR(160) NOT NULL,
     collected_at DATETIME(6) NULL,
     collected_place VARCHAR(400) NOT NULL,
     condition_on_receipt VARCHAR(1000) NOT NULL,
     packaging VARCHAR(400) NOT NULL,
     seal_on_receipt VARCHAR(80) NOT NULL,
     \`sensitive\` BOOLEAN NOT NULL,
     parent_number ${number} NULL,
     registered_at DATETIME(6) NOT NULL,
     registered_by ${uuid} NOT NULL,
     version INT NOT NULL DEFAULT 1,
     holder_id ${uuid} NULL,
     held_since DATETIME(6) NULL,
     location VARCHAR(400) NOT NULL,
     seal VARCHAR(80) NOT NULL,
     pending_sequence INT NULL,
     pending_to_id ${uuid} NULL,
     UNIQUE KEY exhibits_ordinal (case_id, ordinal),
     UNIQUE KEY exhibits_number (case_id, number),
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (case_id, parent_number) REFERENCES exhibits (case_id, number),
     FOREIGN KEY (registered_by) REFERENCES accounts (id),
     FOREIGN KEY (holder_id) REFERENCES accounts (id),
     FOREIGN KEY (pending_to_id) REFERENCES accounts (id)
   ) ENGINE=InnoDB`,
  `CREATE TRIGGER exhibits_refuse_delete BEFORE DELETE ON exhibits FOR EACH ROW
     SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'exhibits are never deleted'`,
  // Where each case's chain and its count of exhibits stand; locked before anything is added to either.
  `CREATE TABLE custody_chains (
     case_id ${uuid} PRIMARY KEY,
     sequence INT NOT NULL,
     hash ${hash} NOT NULL,
     last_ordinal INT NOT NULL,
     FOREIGN KEY (case_id) REFERENCES cases (id)
   ) ENGINE=InnoDB`,
  `CREATE TABLE custody_events (
     case_id ${uuid} NOT NULL,
     sequence INT NOT NULL,
     exhibit ${number} NULL,
     kind VARCHAR(24) NOT NULL,
     recorded_at CHAR(27) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
     previous ${hash} NOT NULL,
     canonical MEDIUMTEXT NOT NULL,
     hash ${hash} NOT NULL,
     PRIMARY KEY (case_id, sequence),
     KEY custody_events_exhibit (case_id, exhibit, sequence),
     FOREIGN KEY (case_id) REFERENCES cases (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  `CREATE TABLE custody_heads (
     case_id ${uuid} NOT NULL,
     sequence INT NOT NULL,
     hash ${hash} NOT NULL,
     signed_at CHAR(27) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
     key_id CHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
     signature CHAR(128) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
     PRIMARY KEY (case_id, sequence),
     FOREIGN KEY (case_id, sequence) REFERENCES custody_events (case_id, sequence)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  `CREATE TABLE exhibit_files (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     exhibit_id ${uuid} NOT NULL,
     name VARCHAR(255) NOT NULL,
     media_type VARCHAR(127) NOT NULL,
     size BIGINT NOT NULL,
     sha256 ${hash} NOT NULL,
     sha512 CHAR(128) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
     stated_sha256 ${hash} NULL,
     taken_in_at DATETIME(6) NOT NULL,
     event_sequence INT NOT NULL,
     width INT NULL,
     height INT NULL,
     latitude DOUBLE NULL,
     longitude DOUBLE NULL,
     metadata TEXT NULL,
     KEY exhibit_files_exhibit (exhibit_id, taken_in_at),
     KEY exhibit_files_case (case_id, sha256),
     KEY exhibit_files_content (sha256),
     FOREIGN KEY (case_id, event_sequence) REFERENCES custody_events (case_id, sequence),
     FOREIGN KEY (exhibit_id) REFERENCES exhibits (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  // What was made from an original for the screen: which one, from which file, and how.
  `CREATE TABLE derivatives (
     file_id ${uuid} NOT NULL,
     kind VARCHAR(24) NOT NULL,
     media_type VARCHAR(127) NOT NULL,
     width INT NOT NULL,
     height INT NOT NULL,
     size BIGINT NOT NULL,
     sha256 ${hash} NOT NULL,
     recipe VARCHAR(400) NOT NULL,
     PRIMARY KEY (file_id, kind),
     KEY derivatives_content (sha256),
     FOREIGN KEY (file_id) REFERENCES exhibit_files (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  ...['custody_events', 'custody_heads', 'exhibit_files', 'derivatives'].flatMap(refuseChanges),
];

export const createExhibitsAndCustody: Migration = {
  name: '2026-12-01-0200-create-exhibits-and-custody',
  async up(sequelize) {
    for (const statement of tables) await run(sequelize, statement);
  },
  async down(sequelize) {
    for (const table of [
      'derivatives',
      'exhibit_files',
      'custody_heads',
      'custody_events',
      'custody_chains',
      'exhibits',
    ]) {
      await run(sequelize, `DROP TABLE ${table}`);
    }
  },
};
