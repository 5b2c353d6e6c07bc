import { run } from '../connection';
import { appendOnly, hash, refuseChanges, uuid, type Migration } from './migration';

const tables = [
  `CREATE TABLE findings (
     case_id ${uuid} PRIMARY KEY,
     document LONGTEXT NOT NULL,
     version INT NOT NULL,
     changed_by ${uuid} NOT NULL,
     changed_at DATETIME(6) NOT NULL,
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (changed_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB`,
  `CREATE TABLE notes (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     number INT NOT NULL,
     author_id ${uuid} NOT NULL,
     recorded_at DATETIME(6) NOT NULL,
     happened_at DATETIME(6) NULL,
     text MEDIUMTEXT NOT NULL,
     corrects_number INT NULL,
     UNIQUE KEY notes_number (case_id, number),
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (case_id, corrects_number) REFERENCES notes (case_id, number),
     FOREIGN KEY (author_id) REFERENCES accounts (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  // The snapshot is the canonical text that the ledger's event names by its SHA-256.
  `CREATE TABLE releases (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     number INT NOT NULL,
     party_id ${uuid} NOT NULL,
     released_at DATETIME(6) NOT NULL,
     released_by ${uuid} NOT NULL,
     snapshot LONGTEXT NOT NULL,
     snapshot_hash ${hash} NOT NULL,
     ledger_sequence INT NOT NULL,
     UNIQUE KEY releases_number (case_id, number),
     KEY releases_party (party_id, released_at),
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (party_id) REFERENCES parties (id),
     FOREIGN KEY (released_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  `CREATE TABLE release_withdrawals (
     release_id ${uuid} PRIMARY KEY,
     withdrawn_at DATETIME(6) NOT NULL,
     withdrawn_by ${uuid} NOT NULL,
     reason VARCHAR(1000) NOT NULL,
     FOREIGN KEY (release_id) REFERENCES releases (id),
     FOREIGN KEY (withdrawn_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  `CREATE TABLE release_openings (
     id ${uuid} PRIMARY KEY,
     release_id ${uuid} NOT NULL,
     account_id ${uuid} NOT NULL,
     opened_at DATETIME(6) NOT NULL,
     what VARCHAR(12) NOT NULL,
     KEY release_openings_release (release_id, opened_at),
     FOREIGN KEY (release_id) REFERENCES releases (id),
     FOREIGN KEY (account_id) REFERENCES accounts (id)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  // How far the building of a release's archive is; the archive follows from the release alone.
  `CREATE TABLE release_archives (
     release_id ${uuid} PRIMARY KEY,
     state VARCHAR(12) NOT NULL,
     size BIGINT NULL,
     sha256 ${hash} NULL,
     message VARCHAR(1000) NOT NULL DEFAULT '',
     KEY release_archives_state (state),
     FOREIGN KEY (release_id) REFERENCES releases (id)
   ) ENGINE=InnoDB`,
  ...['notes', 'releases', 'release_withdrawals', 'release_openings'].flatMap(refuseChanges),
];

export const createFindingsNotesAndReleases: Migration = {
  name: '2026-12-01-0400-create-findings-notes-and-releases',
  async up(sequelize) {
    for (const statement of tables) await run(sequelize, statement);
  },
  async down(sequelize) {
    for (const table of [
      'release_archives',
      'release_openings',
      'release_withdrawals',
      'releases',
      'notes',
      'findings',
    ]) {
      await run(sequelize, `DROP TABLE ${table}`);
    }
  },
};
