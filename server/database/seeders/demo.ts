import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { AccountRole } from '#shared/contracts/accounts';
import { createAccount } from '../../accounts/accounts';
import type { Running } from '../../start';
import { AccountRecord } from '../models/account';
import { loadScene, openUnassigned } from './load-scene';
import { Person } from './person';
import { scene } from './scene';

/** The invented people of the demo laboratory; the password of each is printed at the start. */
const demoPassword = 'drawing table 26';
const people: readonly { name: string; email: string; role: AccountRole }[] = [
  { name: 'M. Quellen', email: 'quellen@quellmere.example', role: 'laboratory-lead' },
  { name: 'E. Varo', email: 'varo@quellmere.example', role: 'investigator' },
  { name: 'J. Oduya', email: 'oduya@quellmere.example', role: 'investigator' },
  { name: 'S. Lindqvist', email: 'lindqvist@quellmere.example', role: 'investigator' },
  { name: 'R. Amadi', email: 'amadi@quellmere.example', role: 'investigator' },
  { name: 'A. Thorne', email: 'thorne@chambers.example', role: 'attorney' },
  { name: 'B. Castellane', email: 'castellane@chambers.example', role: 'attorney' },
];

export interface Colleagues {
  readonly named: (name: string) => Promise<Person>;
  readonly idOf: (name: string) => string;
  readonly password: string;
}

/** Whether the database is empty, so that the demo may be loaded. */
export const isEmpty = async (): Promise<boolean> => (await AccountRecord.count()) === 0;

/** Loads the demo laboratory: its people, and each scene of the samples as a case that was worked. */
export async function loadDemo(running: Running): Promise<void> {
  const { config, log } = running.services;
  const ids = new Map<string, string>();
  for (const person of people) {
    const account = await createAccount({ ...person, password: demoPassword });
    ids.set(person.name, account.id);
  }
  const signedIn = new Map<string, Promise<Person>>();
  const colleagues: Colleagues = {
    password: demoPassword,
    idOf: (name) => {
      const id = ids.get(name);
      if (id === undefined) throw new Error(`The demo laboratory has no ${name}`);
      return id;
    },
    named: (name) => {
      const email = people.find((person) => person.name === name)?.email ?? '';
      const person = signedIn.get(name) ?? Person.signedIn(running.address, email, demoPassword);
      signedIn.set(name, person);
      return person;
    },
  };
  const folders = readdirSync(config.demoDir)
    .map((name) => join(config.demoDir, name))
    .filter((folder) => existsSync(join(folder, 'scene.json')));
  for (const folder of folders) {
    const read = scene.parse(JSON.parse(readFileSync(join(folder, 'scene.json'), 'utf8')));
    await loadScene(folder, read, colleagues);
    log.info({ scene: read.title }, 'demo case loaded');
  }
  await openUnassigned(colleagues);
}
