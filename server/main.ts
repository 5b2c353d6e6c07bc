import { readConfig } from './config';
import { loadDemo } from './database/seeders/demo';
import { createServices, listen, prepareDatabase } from './start';

const config = readConfig(process.env);
await prepareDatabase(config);
const services = createServices(config);
if (config.demo) await loadDemo(services);
const running = await listen(services);
services.log.info({ address: running.address }, 'serving');
// scripts/start.mjs waits for this line.
process.stdout.write(`Centrode serves on ${running.address}\n`);

let stopping = false;
for (const signal of ['SIGINT', 'SIGTERM'] as const) {
  process.on(signal, () => {
    if (stopping) return;
    stopping = true;
    running.stop().then(
      () => process.exit(0),
      () => process.exit(1),
    );
  });
}
