import * as z from 'zod';
import { documentSchemas } from '#shared/engine/computation/schemas';
import { releaseSnapshot } from '../archive/snapshot';

/** JSON Schemas of the documents in an archive, from the very schemas that validate them here. */
export function archiveSchemas(): Record<string, string> {
  const schemas = {
    ...documentSchemas(),
    release: { title: 'centrode.release/1', ...z.toJSONSchema(releaseSnapshot, { io: 'output' }) },
  };
  return Object.fromEntries(
    Object.entries(schemas).map(([name, schema]) => [
      `${name}.schema.json`,
      `${JSON.stringify(schema, null, 2)}\n`,
    ]),
  );
}
