import { Injectable, computed, inject } from '@angular/core';
import { Draft } from '../draft';
import { LiveAnswer } from '../live-answer';
import { Workbench } from '../workbench';

/**
 * What is wrong with the draft, by the thing at fault: what its schema says and what the engine
 * says. Paths name things by their ids, whichever of the two spoke
 * ("bodies.car.points.LF", "stations.S3.knowns.K1").
 */
@Injectable()
export class Faults {
  private readonly draft = inject(Draft);
  private readonly live = inject(LiveAnswer);
  private readonly workbench = inject(Workbench);

  private readonly byPath = computed(() => {
    const found = new Map<string, string>();
    const document = this.draft.document();
    for (const [path, message] of this.draft.faults()) {
      found.set(namedPath(document, path), message);
    }
    const fault = this.live.fault();
    if (fault !== null) {
      found.set(draftPath(fault.field, this.workbench.stationId() ?? ''), fault.message);
    }
    return found;
  });

  /** What keeps the draft from being saved, in one line each. */
  readonly unsavable = computed(() => [...this.draft.faults().values()]);

  /** What is said of this thing or of a part of it. */
  at(path: string): string | undefined {
    for (const [field, message] of this.byPath()) {
      if (field === path || field.startsWith(`${path}.`)) return message;
    }
    return undefined;
  }
}

/** "bodies.0.points.2.at" as "bodies.car.points.RR.at". */
export function namedPath(document: unknown, path: string): string {
  let at: unknown = document;
  return path
    .split('.')
    .map((part) => {
      at = (at as Record<string, unknown> | null | undefined)?.[part];
      const { id, markId, body } = (at ?? {}) as Record<string, unknown>;
      const name = id ?? markId ?? body;
      return /^\d+$/.test(part) && typeof name === 'string' ? name : part;
    })
    .join('.');
}

/** A field of the engine's problems, which speak of one station, as a path into the draft. */
export function draftPath(field: string, stationId: string): string {
  const here = `stations.${stationId}`;
  if (field.startsWith('station.')) return `${here}.${field.slice('station.'.length)}`;
  return /^(marks|knowns)\b/.test(field) ? `${here}.${field}` : field;
}
