import type { Sequelize } from 'sequelize';

/** One change of the schema, named by time, verb and noun; `down` undoes it. */
export interface Migration {
  readonly name: string;
  readonly up: (sequelize: Sequelize) => Promise<void>;
  readonly down: (sequelize: Sequelize) => Promise<void>;
}

/** Column types that every table uses alike. */
export const uuid = 'CHAR(36) CHARACTER SET ascii COLLATE ascii_bin';
export const hash = 'CHAR(64) CHARACTER SET ascii COLLATE ascii_bin';

/**
 * Put in a table's COMMENT: rows are only ever added. The application's account then gets INSERT and
 * SELECT alone (grants.ts), and triggers refuse UPDATE and DELETE to everybody.
 */
export const appendOnly = 'append-only';

/** The two triggers of an append-only table. */
export const refuseChanges = (table: string): string[] =>
  ['UPDATE', 'DELETE'].map(
    (verb) =>
      `CREATE TRIGGER ${table}_refuse_${verb.toLowerCase()} BEFORE ${verb} ON ${table} FOR EACH ROW
       SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = '${table} is append-only'`,
  );
