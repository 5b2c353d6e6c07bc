import * as z from 'zod';
import { caseParams, id, moment, page, pageQuery, prose } from './common';
import { endpoint } from './endpoint';

/** A contemporaneous note: never changed; a mistake is corrected by a new note that names it. */
export const note = z.object({
  id,
  number: z.int().min(1),
  author: z.string(),
  recordedAt: moment,
  /** When what the note tells happened, if the author says so (a late entry). */
  happenedAt: moment.nullable(),
  text: z.string(),
  correctsNumber: z.int().nullable(),
});
export type Note = z.infer<typeof note>;

/** One event of the access log, as people read it. */
export const loggedEvent = z.object({
  sequence: z.int(),
  at: moment,
  actor: z.string(),
  action: z.string(),
  subject: z.string(),
  detail: z.string(),
});
export type LoggedEvent = z.infer<typeof loggedEvent>;

export const listNotes = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/notes',
  summary: 'Notes of the case, oldest first',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(note) }),
});

export const addNote = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/notes',
  summary: 'Write a note',
  access: 'case-custody',
  params: caseParams,
  body: z.strictObject({
    text: prose().min(1, 'must not be empty'),
    happenedAt: moment.nullable().default(null),
    correctsNumber: z.int().min(1).nullable().default(null),
  }),
  response: note,
  status: 201,
});

export const listEvents = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/events',
  summary: 'Recorded events of the case, newest first',
  access: 'case-read',
  params: caseParams,
  query: pageQuery,
  response: page(loggedEvent),
});
