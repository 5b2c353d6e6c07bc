import { createAccount } from '../../accounts/accounts';
import type { Services } from '../../services';
import { AccountRecord } from '../models/account';

/** The invented people of the demo laboratory; their password is printed at the start. */
export const demoPassword = 'drawing table 26';
export const demoPeople = [
  { name: 'M. Quellen', email: 'quellen@quellmere.example', role: 'laboratory-lead' },
  { name: 'E. Varo', email: 'varo@quellmere.example', role: 'investigator' },
  { name: 'J. Oduya', email: 'oduya@quellmere.example', role: 'investigator' },
  { name: 'S. Lindqvist', email: 'lindqvist@quellmere.example', role: 'investigator' },
  { name: 'R. Amadi', email: 'amadi@quellmere.example', role: 'investigator' },
  { name: 'A. Thorne', email: 'thorne@chambers.example', role: 'attorney' },
  { name: 'B. Castellane', email: 'castellane@chambers.example', role: 'attorney' },
] as const;

/** Loads the demo laboratory into an empty database; does nothing where there are accounts. */
export async function loadDemo(services: Services): Promise<void> {
  if ((await AccountRecord.count()) > 0) return;
  for (const person of demoPeople) await createAccount({ ...person, password: demoPassword });
  services.log.info('demo accounts made');
}
