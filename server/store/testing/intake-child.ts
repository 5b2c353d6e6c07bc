/**
 * Takes in one file after the other until it is killed. Each whole intake is noted in a journal that
 * stands for the database: a line there is what a committed row is to the server.
 */
import { randomBytes } from 'node:crypto';
import { appendFile } from 'node:fs/promises';
import { FileStore } from '../file-store';

const [root, journal] = process.argv.slice(2);
const store = new FileStore(root);

async function* slowly(): AsyncGenerator<Buffer> {
  for (let i = 0; i < 6; i++) {
    await new Promise((done) => setTimeout(done, 1));
    yield randomBytes(400_000);
  }
}

process.stdout.write('ready\n');
for (;;) {
  const published = await store.publish(await store.receive(slowly(), 1e9));
  await appendFile(journal, `${published.sha256}\n`, { flush: true });
  await store.settle(published);
}
