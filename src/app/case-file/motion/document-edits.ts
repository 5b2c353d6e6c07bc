import type {
  MarkAssignment,
  ReconstructionBody,
  ReconstructionDocument,
  ReconstructionJoint,
  ReconstructionKnown,
  Station,
} from '#shared/engine/documents/reconstruction';

/** Changes of a reconstruction document; each returns a new one, so that a step can be undone. */
type Edit = (document: ReconstructionDocument) => ReconstructionDocument;

export const emptyDocument: ReconstructionDocument = {
  format: 'centrode.reconstruction/1',
  bodies: [],
  joints: [],
  stations: [],
};

/** A key that no other has: the name's first letters and digits, numbered when it is taken. */
export function freeKey(name: string, taken: readonly string[], fallback: string): string {
  const clean = name.replace(/[^A-Za-z0-9]+/g, '').replace(/^[0-9]+/, '');
  const stem = (clean === '' ? fallback : clean).slice(0, 34);
  if (!taken.includes(stem)) return stem;
  let number = 2;
  while (taken.includes(`${stem}${number}`)) number += 1;
  return `${stem}${number}`;
}

/** "S1", "S2": the first free number. */
export function numberedKey(letter: string, taken: readonly string[]): string {
  let number = 1;
  while (taken.includes(`${letter}${number}`)) number += 1;
  return `${letter}${number}`;
}

const replaced = <T extends { id: string }>(list: readonly T[], id: string, item: T): T[] =>
  list.map((one) => (one.id === id ? item : one));

export const addBody =
  (body: ReconstructionBody): Edit =>
  (document) => ({ ...document, bodies: [...document.bodies, body] });

export const putBody =
  (body: ReconstructionBody): Edit =>
  (document) => ({ ...document, bodies: replaced(document.bodies, body.id, body) });

/** Removes the body and everything that speaks of it. */
export const removeBody =
  (id: string): Edit =>
  (document) => ({
    ...document,
    bodies: document.bodies.filter((body) => body.id !== id),
    joints: document.joints.filter((joint) => !bodiesOf(joint).includes(id)),
    stations: document.stations.map((station) => ({
      ...station,
      marks: station.marks.filter((mark) => mark.body !== id),
      poses: station.poses.filter((pose) => pose.body !== id),
      knowns: station.knowns.filter((known) => bodyOfKnown(known) !== id),
    })),
  });

/** Gives a point another short name, everywhere. */
export const renamePoint =
  (body: string, from: string, to: string): Edit =>
  (document) => {
    const at = <T extends { body: string; point: string }>(ref: T): T =>
      ref.body === body && ref.point === from ? { ...ref, point: to } : ref;
    return {
      ...document,
      bodies: document.bodies.map((one) =>
        one.id === body
          ? { ...one, points: one.points.map((p) => (p.id === from ? { ...p, id: to } : p)) }
          : one,
      ),
      joints: document.joints.map((joint) =>
        'b' in joint ? { ...joint, a: at(joint.a), b: at(joint.b) } : { ...joint, a: at(joint.a) },
      ),
      stations: document.stations.map((station) => ({
        ...station,
        marks: station.marks.map(at),
        knowns: station.knowns.map((known) =>
          'at' in known ? { ...known, at: at(known.at) } : known,
        ),
      })),
    };
  };

/** Removes the point and everything that speaks of it. */
export const removePoint =
  (body: string, point: string): Edit =>
  (document) => {
    const names = (ref: { body: string; point: string }) =>
      ref.body === body && ref.point === point;
    return {
      ...document,
      bodies: document.bodies.map((one) =>
        one.id === body ? { ...one, points: one.points.filter((p) => p.id !== point) } : one,
      ),
      joints: document.joints.filter(
        (joint) => !names(joint.a) && !('b' in joint && names(joint.b)),
      ),
      stations: document.stations.map((station) => ({
        ...station,
        marks: station.marks.filter((mark) => !names(mark)),
        knowns: station.knowns.filter((known) => !('at' in known && names(known.at))),
      })),
    };
  };

export const addJoint =
  (joint: ReconstructionJoint): Edit =>
  (document) => ({ ...document, joints: [...document.joints, joint] });

export const putJoint =
  (joint: ReconstructionJoint): Edit =>
  (document) => ({ ...document, joints: replaced(document.joints, joint.id, joint) });

export const removeJoint =
  (id: string): Edit =>
  (document) => ({
    ...document,
    joints: document.joints.filter((joint) => joint.id !== id),
    stations: document.stations.map((station) => ({
      ...station,
      joints: { off: station.joints.off.filter((off) => off !== id) },
    })),
  });

export const addStation =
  (station: Station): Edit =>
  (document) => ({ ...document, stations: [...document.stations, station] });

export const putStation =
  (station: Station): Edit =>
  (document) => ({ ...document, stations: replaced(document.stations, station.id, station) });

export const removeStation =
  (id: string): Edit =>
  (document) => ({ ...document, stations: document.stations.filter((one) => one.id !== id) });

/** Moves a station one place earlier (-1) or later (1) in the order of the motion. */
export const moveStation =
  (id: string, by: -1 | 1): Edit =>
  (document) => {
    const stations = [...document.stations];
    const from = stations.findIndex((station) => station.id === id);
    const to = from + by;
    if (from < 0 || to < 0 || to >= stations.length) return document;
    [stations[from], stations[to]] = [stations[to], stations[from]];
    return { ...document, stations };
  };

export const editStation =
  (id: string, change: (station: Station) => Station): Edit =>
  (document) => ({
    ...document,
    stations: document.stations.map((station) => (station.id === id ? change(station) : station)),
  });

export const putKnown = (stationId: string, known: ReconstructionKnown): Edit =>
  editStation(stationId, (station) => ({
    ...station,
    knowns: station.knowns.some((one) => one.id === known.id)
      ? replaced(station.knowns, known.id, known)
      : [...station.knowns, known],
  }));

export const removeKnown = (stationId: string, id: string): Edit =>
  editStation(stationId, (station) => ({
    ...station,
    knowns: station.knowns.filter((known) => known.id !== id),
  }));

/** One mark tells one thing at a station: assigning it again replaces what it said. */
export const assignMark = (stationId: string, assignment: MarkAssignment): Edit =>
  editStation(stationId, (station) => ({
    ...station,
    marks: station.marks.some((one) => one.markId === assignment.markId)
      ? station.marks.map((one) => (one.markId === assignment.markId ? assignment : one))
      : [...station.marks, assignment],
  }));

export const releaseMark = (stationId: string, markId: string): Edit =>
  editStation(stationId, (station) => ({
    ...station,
    marks: station.marks.filter((one) => one.markId !== markId),
  }));

export function bodiesOf(joint: ReconstructionJoint): string[] {
  return 'b' in joint ? [joint.a.body, joint.b.body] : [joint.a.body];
}

export function bodyOfKnown(known: ReconstructionKnown): string {
  return 'at' in known ? known.at.body : known.body;
}

export const newStation = (id: string, name: string): Station => ({
  id,
  name,
  marks: [],
  poses: [],
  joints: { off: [] },
  knowns: [],
});
