import { readConfig } from './config';
import { isEmpty, loadDemo } from './database/seeders/demo';
import { createServices, listen, prepareDatabase } from './start';

const config = readConfig(process.env);
await prepareDatabase(config);
const services = createServices(config);
const loadTheDemo = config.demo && (await isEmpty());
const running = await listen(services);
let stopping = false;
function stop(): void {
  if (stopping) return;
  stopping = true;
  running.stop().then(
    () => process.exit(0),
    () => process.exit(1),
  );
}
process.on('SIGINT', stop);
process.on('SIGTERM', stop);
// scripts/start.mjs was killed: nothing may be left that holds the port.
process.on('disconnect', stop);

if (loadTheDemo) await loadDemo(running);
services.log.info({ address: running.address }, 'serving');
// scripts/start.mjs waits for this line.
process.stdout.write(`Centrode serves on ${running.address}\n`);
