import type { Vec3, CameraPose } from './picture/camera';
import type { Stage } from './picture/render';
import type { Vec2 } from './plane-motion';
import type { CustodyEntry, Exhibit, Scene } from './scene';
import type { Sketch } from './sketch';

/** A photograph to be taken. */
export interface Shot {
  number: number;
  title: string;
  takenAt: string;
  takenBy: string;
  sensitive: boolean;
  camera: CameraPose;
  /** What stands before the camera; scenes may differ from shot to shot. */
  stage: 'main' | 'detail';
}

export interface Visible {
  survey: string;
  point: Vec3;
}

/** Everything of a scene that is data; `build` adds pictures, sketch, hashes and the file list. */
export interface Draft {
  folder: string;
  scene: Omit<Scene, 'format' | 'notice' | 'exhibits' | 'photographs'>;
  exhibits: (Omit<Exhibit, 'files'> & { files: readonly (readonly [string, string])[] })[];
  /** Text and JSON files by path. */
  texts: Record<string, string>;
  documents: Record<string, unknown>;
  shots: Shot[];
  visible: Visible[];
  /** Position of a shot's camera on the earth. */
  whereabouts: (eye: Vec3) => { latitude: number; longitude: number; altitude: number };
  stages: () => Promise<Record<Shot['stage'], Stage>>;
  sketch: Sketch;
  sketchFile: string;
}

export const photographFile = (shot: Pick<Shot, 'number'>): string =>
  `photographs/photograph-${String(shot.number).padStart(2, '0')}.jpg`;

/** The usual way of a sealed item: collected, received, stored, then examined by its examiner. */
export function sealedItemCustody(input: {
  exhibit: number;
  collectedAt: string;
  collectedBy: string;
  custodian: string;
  receivedAt: string;
  examiner: string;
  examinedAt: string;
  seals: readonly [string, string];
  from: string;
}): CustodyEntry[] {
  const { exhibit, custodian, examiner, seals, collectedBy } = input;
  const entry = (part: Omit<CustodyEntry, 'exhibit'>): CustodyEntry => ({ exhibit, ...part });
  return [
    entry({
      kind: 'collected',
      at: input.collectedAt,
      from: null,
      to: collectedBy,
      purpose: 'Secured as evidence',
      sealBefore: null,
      sealAfter: seals[0],
      location: input.from,
    }),
    entry({
      kind: 'handed-over',
      at: input.receivedAt,
      from: collectedBy,
      to: custodian,
      purpose: 'Storage',
      sealBefore: seals[0],
      sealAfter: seals[0],
      location: 'Laboratory, reception',
    }),
    entry({
      kind: 'accepted',
      at: input.receivedAt.replace(/:00-/, ':40-'),
      from: collectedBy,
      to: custodian,
      purpose: 'Storage',
      sealBefore: seals[0],
      sealAfter: seals[0],
      location: 'Laboratory, exhibit store',
    }),
    entry({
      kind: 'opened',
      at: input.examinedAt,
      from: custodian,
      to: examiner,
      purpose: 'Examination',
      sealBefore: seals[0],
      sealAfter: null,
      location: 'Laboratory, examination room',
    }),
    entry({
      kind: 'sealed',
      at: input.examinedAt.replace(/T(\d\d)/, (_all, hour: string) => `T${Number(hour) + 2}`),
      from: examiner,
      to: custodian,
      purpose: 'Return to store',
      sealBefore: null,
      sealAfter: seals[1],
      location: 'Laboratory, exhibit store',
    }),
  ];
}

/** Turns scene positions into positions on the (invented) place's part of the earth. */
export function whereaboutsAt(
  origin: { latitude: number; longitude: number; altitude: number },
  bearingOfX: number,
): Draft['whereabouts'] {
  const bearing = (bearingOfX * Math.PI) / 180;
  const metresPerDegree = 111_320;
  return ([x, y, z]) => {
    const north = x * Math.cos(bearing) + y * Math.sin(bearing);
    const east = x * Math.sin(bearing) - y * Math.cos(bearing);
    const parallel = Math.cos((origin.latitude * Math.PI) / 180);
    return {
      latitude: origin.latitude + north / metresPerDegree,
      longitude: origin.longitude + east / (metresPerDegree * parallel),
      altitude: origin.altitude + z,
    };
  };
}

export const beside = (at: Vec2, dx: number, dy: number): Vec2 => [at[0] + dx, at[1] + dy];
