import { addNote, listEvents, listNotes } from '#shared/contracts/log';
import { implement, type Route } from '../http/route';
import { eventsOf } from './events';
import * as notes from './notes';

export const logRoutes: Route[] = [
  implement(listNotes, ({ scope }) => notes.listNotes(scope)),
  implement(addNote, ({ scope, body, services }) => notes.writeNote(services, scope, body)),
  implement(listEvents, ({ scope, query }) => eventsOf(scope, query)),
];
