import { type Draft, photographFile, sealedItemCustody } from './draft';
import type { Vec3 } from './picture/camera';
import { PRESS_SHOTS, pressStages } from './press-pictures';
import { pressSketch } from './press-sketch';
import { SHAFT_HEIGHT } from './press-parts';
import { DATUMS, PRESS_COLUMNS, pressSurvey, pressSurveyCsv } from './press-survey';
import { pressTruth } from './press-truth';
import { NOTICE } from './scene';
import {
  EXHIBIT,
  PLATE,
  PLATE_SPEED,
  jointsOf,
  pressBodies,
  reconstruction,
} from './press-reconstruction';

const ORIGIN = { latitude: -45.2107, longitude: -119.7718, altitude: 8 };
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
      point: [x, -0.004, y + SHAFT_HEIGHT] as const,
    })),
    whereabouts,
    stages: pressStages,
    sketch: pressSketch(survey),
    sketchFile: 'inspection-note.pdf',
  };
}
