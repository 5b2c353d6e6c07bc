import { type Draft, photographFile, sealedItemCustody } from './draft';
import type { Vec3 } from './picture/camera';
import { PRESS } from './press-motion';
import { PRESS_SHOTS, pressStages } from './press-pictures';
import { CRANK_OUTLINE, RAM_OUTLINE, ROD_OUTLINE, pressSketch } from './press-sketch';
import { SHAFT_HEIGHT } from './press-parts';
import {
  DATUMS,
  FOUND_POINTS,
  PRESS_COLUMNS,
  PRESS_SIGMA,
  type PressSurvey,
  WITNESSES,
  pressSurvey,
  pressSurveyCsv,
} from './press-survey';
import { pressTruth } from './press-truth';
import type { Vec2 } from './plane-motion';
import { rounded } from './folder';
import { type Joint, NOTICE, type Reconstruction, type SceneBody, type Station } from './scene';

const ORIGIN = { latitude: -45.2107, longitude: -119.7718, altitude: 8 };
const EXHIBIT = {
  survey: 1,
  photographs: 2,
  machine: 3,
  note: 4,
  bolt: 5,
  glove: 6,
  glovePhotograph: 7,
};
const POINT_SIGMA = 0.0002;

/** Motor speed over gear, rad/s, and the plate's tolerance as a rectangular half-width. */
const PLATE = { motorPerMinute: 960, gear: 17, tolerance: 0.03 };
const PLATE_SPEED = (PLATE.motorPerMinute * 2 * Math.PI) / 60 / PLATE.gear;

const TITLES: Record<string, string> = {
  O: 'crank shaft centre',
  A: 'crank pin',
  B: 'ram pin',
  H: 'ram, upper guide pad',
  P1: 'bruise on the web rim',
  P2: 'bare patch on the counterweight',
  Q1: 'scrape on the rod shank',
  CL: 'ram, lower left edge',
  CR: 'ram, lower right edge',
};

function body(
  id: 'crank' | 'rod' | 'ram',
  name: string,
  colour: string,
  outline: Vec2[],
): SceneBody {
  const points = Object.entries<Vec2>(PRESS.points[id]).map(([point, at]) => {
    const origin = at[0] === 0 && at[1] === 0;
    const sigma: Vec2 = origin ? [0, 0] : [POINT_SIGMA, POINT_SIGMA];
    return [point, { at, sigma, title: TITLES[point] }] as const;
  });
  return {
    id,
    name,
    colour,
    points: Object.fromEntries(points),
    outline,
    mass: null,
    inertia: null,
  };
}

export function pressBodies(): SceneBody[] {
  return [
    body('crank', 'Crank with web', 'steel', CRANK_OUTLINE),
    body('rod', 'Connecting rod', 'steel', ROD_OUTLINE),
    body('ram', 'Ram', 'steel', RAM_OUTLINE),
  ];
}

function jointsOf(survey: PressSurvey): Joint[] {
  const down = -Math.PI / 2;
  const measured = new Map(survey.book.rows.map((row) => [row.id, row.at]));
  const rails = survey.lines.map(({ points }) => points);
  const mean = (ids: readonly string[]): number =>
    ids.reduce((sum, id) => sum + (measured.get(id)?.[0] ?? 0), 0) / ids.length;
  const middle = (mean(rails[0]) + mean(rails[1])) / 2;
  const guide = (id: string, title: string, point: string): Joint => ({
    id,
    title,
    kind: 'guide',
    a: { body: 'ram', point },
    direction: down,
    radius: null,
    at: [middle, -0.4],
    sigma: PRESS_SIGMA.edge,
    survey: rails.flat(),
  });
  return rounded(
    [
      {
        id: 'shaft',
        title: 'Crank shaft in the frame',
        kind: 'pin',
        a: { body: 'crank', point: 'O' },
        ground: true,
        at: measured.get('O') ?? PRESS.shaft,
        sigma: PRESS_SIGMA.edge,
        survey: ['O'],
      },
      {
        id: 'crank-pin',
        title: 'Crank pin',
        kind: 'pin',
        a: { body: 'crank', point: 'A' },
        b: { body: 'rod', point: 'A' },
      },
      {
        id: 'ram-pin',
        title: 'Ram pin',
        kind: 'pin',
        a: { body: 'rod', point: 'B' },
        b: { body: 'ram', point: 'B' },
      },
      guide('lower-guide', 'Ram in the gibs at the ram pin', 'B'),
      guide('upper-guide', 'Ram in the gibs at the upper pad', 'H'),
    ],
    9,
  );
}

function stationsOf(): Station[] {
  return rounded(
    [
      {
        id: 'S1',
        title: 'Contact with the guard frame',
        basis: 'Five fresh marks that fit together in one position of crank, rod and ram only.',
        marks: WITNESSES.map(({ id, body: part, point }) => ({ survey: id, body: part, point })),
        tangents: [],
        knowns: [
          {
            id: 'S1-crank-speed',
            title: 'Motor plate over gear ratio, 3 per cent either way, evenly likely',
            source: { file: 'machine.json', exhibit: EXHIBIT.machine },
            quantity: 'angular-velocity',
            body: 'crank',
            value: PLATE_SPEED,
            sigma: (PLATE_SPEED * PLATE.tolerance) / Math.sqrt(3),
          },
          {
            id: 'S1-crank-acceleration',
            title: 'Flywheel drive runs evenly; slowing under load bounded by its inertia',
            source: { file: 'machine.json', exhibit: EXHIBIT.machine },
            quantity: 'angular-acceleration',
            body: 'crank',
            value: 0,
            sigma: 0.5,
          },
        ],
        checks: [],
      },
      {
        id: 'S2',
        title: 'As found, locked out',
        basis: 'Measured on the machine at rest.',
        marks: FOUND_POINTS.map(({ id, body: part, point }) => ({ survey: id, body: part, point })),
        tangents: [],
        knowns: [],
        checks: [],
      },
    ],
    6,
  );
}

function reconstruction(survey: PressSurvey): Reconstruction {
  return {
    title: 'Press 4 at contact',
    assumption: 'The crank turned counter-clockwise, down stroke, at the speed of the motor plate.',
    bodies: pressBodies(),
    joints: jointsOf(survey),
    stations: stationsOf(),
    traces: [],
    timeBase: [],
    alternatives: [
      {
        id: 'B',
        title: 'Ram dents older',
        assumption:
          'The gib dents W4 and W5 are from an earlier event; only W1, W2 and W3 fix the position.',
        traces: {},
        marks: {},
        droppedJoints: [],
      },
    ],
    asked: [
      { station: 'S1', body: 'ram', point: 'B', quantity: 'speed', question: 1 },
      { station: 'S1', body: 'ram', point: 'B', quantity: 'acceleration', question: 2 },
      { station: 'S2', body: 'crank', point: null, quantity: 'pose', question: 3 },
    ],
  };
}

/** The press hall is indoors: every photograph has the position of its door. */
const whereabouts = ([, , z]: Vec3): ReturnType<Draft['whereabouts']> => ({
  latitude: ORIGIN.latitude,
  longitude: ORIGIN.longitude,
  altitude: ORIGIN.altitude + z,
});

/** The whole of case 2026-011 but its pictures. */
export function pressDraft(): Draft {
  const survey = pressSurvey();
  const joints = jointsOf(survey);
  const base = { packaging: null, seal: null, sensitivity: 'ordinary', parent: null } as const;
  const digital = { ...base, location: 'Digital store' } as const;
  const open = PRESS_SHOTS.filter((shot) => !shot.sensitive);
  const kept = PRESS_SHOTS.filter((shot) => shot.sensitive);
  return {
    folder: 'press',
    scene: {
      number: '2026-011',
      title: 'Press 4, Fennel Works',
      kind: 'machine',
      place: { name: 'Fennel Works, press hall (invented)', ...ORIGIN, utcOffset: '-08:00' },
      incidentAt: '2026-08-19T10:52:00-08:00',
      bearingOfX: null,
      frame: 'Elevation from the operator side: origin at the crank shaft, x to the right, y up.',
      brief: {
        instructedBy: 'A. Thorne',
        instructedAt: '2026-08-24T10:00:00-08:00',
        dueAt: '2026-12-04T17:00:00-08:00',
        background:
          'The guard frame of press 4 was out of line and the descending ram struck it. An operator, who had ' +
          'a hand at the frame, was hurt. The claimant says that the guard could not have stopped the press ' +
          'in time; the defendant says that the press ran at its rated speed and stopped as it should.',
        questions: [
          { number: 1, text: 'How fast did the ram move when it struck the guard frame?' },
          { number: 2, text: 'What was the acceleration of the ram at that moment?' },
          { number: 3, text: 'How far did crank and ram move between contact and rest?' },
        ],
        cautions: [
          'Stored energy: isolate and lock out, block the flywheel, prop the ram before reaching in.',
          'Exhibits 6 and 7 are sensitive.',
        ],
      },
      parties: [
        {
          id: 'claimant',
          name: 'The claimant, press operator',
          role: 'claimant',
          attorney: 'A. Thorne',
        },
        { id: 'defendant', name: 'Fennel Works', role: 'defendant', attorney: 'B. Castellane' },
      ],
      people: [
        { name: 'J. Oduya', role: 'lead-investigator' },
        { name: 'S. Lindqvist', role: 'investigator' },
        { name: 'R. Amadi', role: 'technical-reviewer' },
        { name: 'E. Varo', role: 'evidence-custodian' },
      ],
      custody: [
        ...sealedItemCustody({
          exhibit: EXHIBIT.bolt,
          collectedAt: '2026-08-19T17:20:00-08:00',
          collectedBy: 'J. Oduya',
          custodian: 'E. Varo',
          receivedAt: '2026-08-19T19:40:00-08:00',
          examiner: 'J. Oduya',
          examinedAt: '2026-08-21T09:30:00-08:00',
          seals: ['QL 204301', 'QL 204309'],
          from: 'Fennel Works, press hall',
        }),
        ...sealedItemCustody({
          exhibit: EXHIBIT.glove,
          collectedAt: '2026-08-19T17:05:00-08:00',
          collectedBy: 'S. Lindqvist',
          custodian: 'E. Varo',
          receivedAt: '2026-08-19T19:45:00-08:00',
          examiner: 'S. Lindqvist',
          examinedAt: '2026-08-21T14:00:00-08:00',
          seals: ['QL 204302', 'QL 204310'],
          from: 'Fennel Works, press hall',
        }),
      ],
      survey: {
        file: 'survey.csv',
        lengthUnit: 'mm',
        delimiter: ',',
        columns: {
          id: PRESS_COLUMNS[0],
          code: PRESS_COLUMNS[1],
          string: PRESS_COLUMNS[2],
          sequence: PRESS_COLUMNS[3],
          x: PRESS_COLUMNS[4],
          y: PRESS_COLUMNS[5],
          height: null,
          sigmaX: PRESS_COLUMNS[6],
          sigmaY: PRESS_COLUMNS[7],
          remark: PRESS_COLUMNS[8],
        },
        sigmaUnit: 'mm',
        instrument: 'Measuring arm QA 7, ball probe 6 mm (invented instrument)',
        surveyedBy: 'J. Oduya',
        surveyedAt: '2026-08-19T15:10:00-08:00',
        codes: {
          DAT: 'control point, datum hole',
          CEN: 'other, centre of a shaft',
          GIB: 'other, guide face',
          WIT: 'witness mark of the moment of contact',
          LOC: 'point of rest, machine part as found',
        },
        controlPoints: Object.keys(DATUMS),
        lines: survey.lines,
      },
      reconstruction: reconstruction(survey),
    },
    exhibits: [
      {
        ...digital,
        number: EXHIBIT.survey,
        kind: 'survey-data',
        title: 'Measurements on press 4',
        description:
          'Datum holes, shaft, guide faces, five witness marks, parts as found; millimetres.',
        source: 'Press 4, locked out',
        collectedBy: 'J. Oduya',
        collectedAt: '2026-08-19T15:10:00-08:00',
        condition: 'Complete export, 1 file',
        files: [['survey.csv', 'Arm export']],
      },
      {
        ...digital,
        number: EXHIBIT.photographs,
        kind: 'photograph-set',
        title: 'Photographs of press 4',
        description: 'Overall views, web, gib, motor plate; tags at the witness marks.',
        source: 'Fennel Works, press hall',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-08-19T16:12:00-08:00',
        condition: 'Originals from the camera card',
        files: open.map((shot) => [photographFile(shot), shot.title] as const),
      },
      {
        ...digital,
        number: EXHIBIT.machine,
        kind: 'document',
        title: 'Dimensions and drive data of press 4',
        description:
          'Crank, rod and ram from the maker\u2019s drawing, checked by arm; motor plate and gear.',
        source: 'Fennel Works, maintenance office',
        collectedBy: 'J. Oduya',
        collectedAt: '2026-08-20T09:00:00-08:00',
        condition: 'Complete',
        files: [['machine.json', 'Dimensions and drive data']],
      },
      {
        ...digital,
        number: EXHIBIT.note,
        kind: 'document',
        title: 'Inspection note',
        description: 'Elevation with witness marks, condition of brake and guard, lock-out record.',
        source: 'Written at the press',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-08-19T18:05:00-08:00',
        condition: '1 page',
        files: [['inspection-note.pdf', 'Inspection note']],
      },
      {
        ...base,
        number: EXHIBIT.bolt,
        kind: 'physical-item',
        title: 'Guard bolt',
        description: 'Bolt with bruised end, from the left guard bracket.',
        source: 'Press 4, left guard bracket',
        collectedBy: 'J. Oduya',
        collectedAt: '2026-08-19T17:20:00-08:00',
        condition: 'Bruise bright, no rust',
        packaging: 'Screw-top box',
        seal: 'QL 204309',
        location: 'Exhibit store, shelf 5',
        files: [],
      },
      {
        ...base,
        number: EXHIBIT.glove,
        kind: 'physical-item',
        title: 'Work glove with a stain',
        description: 'Left glove, knitted cuff, one stain on the palm side.',
        source: 'Press 4, die space',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-08-19T17:05:00-08:00',
        condition: 'Dry, one stain',
        packaging: 'Paper bag in a rigid box',
        seal: 'QL 204310',
        sensitivity: 'sensitive',
        location: 'Exhibit store, locked cabinet',
        files: [],
      },
      {
        ...digital,
        number: EXHIBIT.glovePhotograph,
        kind: 'photograph-set',
        title: 'Photograph of the glove',
        description: 'The glove of exhibit 6 on the bench with a rule.',
        source: 'Fennel Works, press hall',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-08-19T16:48:00-08:00',
        condition: 'Original from the camera card',
        sensitivity: 'sensitive',
        parent: EXHIBIT.glove,
        files: kept.map((shot) => [photographFile(shot), shot.title] as const),
      },
    ],
    texts: { 'survey.csv': pressSurveyCsv(survey.book.rows) },
    documents: {
      'machine.json': {
        format: 'centrode.demo-body/1',
        notice: NOTICE,
        bodies: pressBodies(),
        joints,
        drive: {
          ...PLATE,
          crankSpeed: Number(PLATE_SPEED.toFixed(6)),
          distribution: 'rectangular',
        },
      },
      'truth.json': pressTruth(),
    },
    shots: [...PRESS_SHOTS],
    visible: Object.entries(DATUMS).map(([id, [x, y]]) => ({
      survey: id,
      point: [x, y > 0 ? 0.075 : -0.28, y + SHAFT_HEIGHT] as const,
    })),
    whereabouts,
    stages: pressStages,
    sketch: pressSketch(survey),
    sketchFile: 'inspection-note.pdf',
  };
}
