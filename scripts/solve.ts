import { readFileSync } from 'node:fs';
import { solveDocument } from '#shared/engine/computation/index';
import { EngineError } from '#shared/engine/errors';

const [file] = process.argv.slice(2);
if (file === undefined) {
  console.error('Usage: npm run solve -- FILE (a problem document); prints its solution');
  process.exitCode = 2;
} else {
  try {
    const document: unknown = JSON.parse(readFileSync(file, 'utf8'));
    console.log(JSON.stringify(solveDocument(document), null, 2));
  } catch (error) {
    if (!(error instanceof EngineError) && !(error instanceof SyntaxError)) throw error;
    const where = error instanceof EngineError && error.field !== '' ? `${error.field}: ` : '';
    console.error(`${where}${error.message}`);
    process.exitCode = 1;
  }
}
