import { access, constants, mkdir } from 'node:fs/promises';
import { QueryTypes } from 'sequelize';
import * as z from 'zod';
import { endpoint } from '#shared/contracts/endpoint';
import { HttpProblem } from './problems';
import { implement } from './route';

const health = endpoint({
  method: 'GET',
  path: '/api/health',
  summary: 'Whether database and store are usable',
  access: 'public',
  response: z.object({ database: z.literal('usable'), store: z.literal('usable') }),
});

export const healthRoute = implement(health, async ({ services }) => {
  const { sequelize, config } = services;
  try {
    await sequelize.query('SELECT 1 FROM accounts LIMIT 1', { type: QueryTypes.SELECT });
  } catch {
    throw new HttpProblem(503, 'Not available now', 'The database does not answer.');
  }
  try {
    await mkdir(config.dataDir, { recursive: true });
    await access(config.dataDir, constants.W_OK);
  } catch {
    throw new HttpProblem(503, 'Not available now', 'The store cannot be written.');
  }
  return { database: 'usable' as const, store: 'usable' as const };
});
