import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';

interface Ref {
  readonly body: string;
  readonly point: string;
}

export interface Names {
  readonly body: (id: string) => string;
  /** "left rear wheel"; with the body's name where the reconstruction has several bodies. */
  readonly point: (ref: Ref) => string;
}

/** What people call the things that a document names by keys. */
export function namesIn(document: ReconstructionDocument | null): Names {
  const bodies = document?.bodies ?? [];
  const bodyOf = (id: string) => bodies.find((body) => body.id === id);
  const body = (id: string) => bodyOf(id)?.name ?? id;
  return {
    body,
    point: (ref) => {
      const name =
        bodyOf(ref.body)?.points.find((point) => point.id === ref.point)?.name ?? ref.point;
      return bodies.length > 1 ? `${name} of ${body(ref.body)}` : name;
    },
  };
}

/** "body.point" taken apart. */
export function refOf(key: string): Ref {
  const dot = key.indexOf('.');
  return { body: key.slice(0, dot), point: key.slice(dot + 1) };
}

export const keyOf = (ref: Ref): string => `${ref.body}.${ref.point}`;
