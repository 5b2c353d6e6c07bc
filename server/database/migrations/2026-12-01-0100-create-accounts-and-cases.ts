import { run } from '../connection';
import { appendOnly, hash, refuseChanges, uuid, type Migration } from './migration';

const tables = [
  `CREATE TABLE accounts (
     id ${uuid} PRIMARY KEY,
     email VARCHAR(320) NOT NULL,
     name VARCHAR(120) NOT NULL,
     role VARCHAR(20) NOT NULL,
     password_hash VARCHAR(200) NOT NULL,
     active BOOLEAN NOT NULL,
     created_at DATETIME(6) NOT NULL,
     UNIQUE KEY accounts_email (email)
   ) ENGINE=InnoDB`,
  `CREATE TABLE sessions (
     sid VARCHAR(128) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
     expires DATETIME NULL,
     data TEXT NULL,
     created_at DATETIME NOT NULL,
     updated_at DATETIME NOT NULL,
     KEY sessions_expires (expires)
   ) ENGINE=InnoDB`,
  `CREATE TABLE cases (
     id ${uuid} PRIMARY KEY,
     number VARCHAR(20) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
     title VARCHAR(160) NOT NULL,
     kind VARCHAR(40) NOT NULL,
     stage VARCHAR(24) NOT NULL,
     commissioned_by VARCHAR(400) NOT NULL DEFAULT '',
     jurisdiction VARCHAR(200) NOT NULL DEFAULT '',
     incident_on DATE NULL,
     place VARCHAR(400) NOT NULL DEFAULT '',
     circumstances MEDIUMTEXT NOT NULL,
     due_on DATE NULL,
     speed_unit VARCHAR(4) NOT NULL DEFAULT 'km/h',
     x_axis_bearing DOUBLE NULL,
     opened_at DATETIME(6) NOT NULL,
     version INT NOT NULL DEFAULT 1,
     UNIQUE KEY cases_number (number)
   ) ENGINE=InnoDB`,
  `CREATE TABLE parties (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     name VARCHAR(160) NOT NULL,
     role VARCHAR(80) NOT NULL,
     FOREIGN KEY (case_id) REFERENCES cases (id)
   ) ENGINE=InnoDB`,
  `CREATE TABLE questions (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     number INT NOT NULL,
     text VARCHAR(1000) NOT NULL,
     UNIQUE KEY questions_number (case_id, number),
     FOREIGN KEY (case_id) REFERENCES cases (id)
   ) ENGINE=InnoDB`,
  `CREATE TABLE assignments (
     id ${uuid} PRIMARY KEY,
     case_id ${uuid} NOT NULL,
     account_id ${uuid} NOT NULL,
     role VARCHAR(24) NOT NULL,
     party_id ${uuid} NULL,
     conflict BOOLEAN NOT NULL,
     conflict_statement VARCHAR(2000) NOT NULL,
     override_reason VARCHAR(2000) NULL,
     assigned_by ${uuid} NOT NULL,
     assigned_at DATETIME(6) NOT NULL,
     ended_at DATETIME(6) NULL,
     KEY assignments_account (account_id, ended_at, case_id),
     FOREIGN KEY (case_id) REFERENCES cases (id),
     FOREIGN KEY (account_id) REFERENCES accounts (id),
     FOREIGN KEY (party_id) REFERENCES parties (id),
     FOREIGN KEY (assigned_by) REFERENCES accounts (id)
   ) ENGINE=InnoDB`,
  `CREATE TABLE idempotency_keys (
     account_id ${uuid} NOT NULL,
     idempotency_key VARCHAR(80) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
     digest ${hash} NOT NULL,
     status INT NOT NULL,
     answer LONGTEXT NOT NULL,
     PRIMARY KEY (account_id, idempotency_key),
     FOREIGN KEY (account_id) REFERENCES accounts (id)
   ) ENGINE=InnoDB`,
  `CREATE TABLE access_events (
     sequence BIGINT PRIMARY KEY,
     case_id ${uuid} NULL,
     actor_id ${uuid} NULL,
     action VARCHAR(60) NOT NULL,
     canonical MEDIUMTEXT NOT NULL,
     hash ${hash} NOT NULL,
     KEY access_events_case (case_id, sequence),
     KEY access_events_actor (actor_id, sequence)
   ) ENGINE=InnoDB COMMENT='${appendOnly}'`,
  // One row: where the access log's chain stands; locked while a batch is appended.
  `CREATE TABLE access_head (
     id TINYINT PRIMARY KEY,
     sequence BIGINT NOT NULL,
     hash ${hash} NOT NULL
   ) ENGINE=InnoDB`,
  `INSERT INTO access_head VALUES (1, 0, '${'0'.repeat(64)}')`,
  ...refuseChanges('access_events'),
];

export const createAccountsAndCases: Migration = {
  name: '2026-12-01-0100-create-accounts-and-cases',
  async up(sequelize) {
    for (const statement of tables) await run(sequelize, statement);
  },
  async down(sequelize) {
    for (const table of [
      'access_head',
      'access_events',
      'idempotency_keys',
      'assignments',
      'questions',
      'parties',
      'cases',
      'sessions',
      'accounts',
    ]) {
      await run(sequelize, `DROP TABLE ${table}`);
    }
  },
};
