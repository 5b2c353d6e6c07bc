import { type Draft, photographFile, sealedItemCustody, whereaboutsAt } from './draft';
import { JACK_KNIFE_SHOTS, jackKnifeStages } from './jack-knife-pictures';
import { jackKnifeSketch } from './jack-knife-sketch';
import { jackKnifeMotion } from './jack-knife-motion';
import {
  UNIT_COLUMNS,
  UNIT_CONTROL,
  jackKnifeSurvey,
  tachograph,
  tachographCsv,
  unitSurveyCsv,
} from './jack-knife-survey';
import { jackKnifeTruth } from './jack-knife-truth';
import { NOTICE } from './scene';
import { EXHIBIT, JOINTS, reconstruction, unitBodies } from './jack-knife-reconstruction';

const BEARING_OF_X = 112;
const ORIGIN = { latitude: -46.8834, longitude: -121.0412, altitude: 112 };
/** The whole of case 2026-013 but its pictures. */
export function jackKnifeDraft(): Draft {
  const motion = jackKnifeMotion();
  const survey = jackKnifeSurvey(motion);
  const base = { packaging: null, seal: null, sensitivity: 'ordinary', parent: null } as const;
  const digital = { ...base, location: 'Digital store' } as const;
  return {
    folder: 'jack-knife',
    scene: {
      number: '2026-013',
      title: 'Articulated unit, Tarn Cutting',
      kind: 'road',
      place: { name: 'Tarn Cutting, second straight (invented)', ...ORIGIN, utcOffset: '-08:00' },
      incidentAt: '2026-09-29T06:35:00-08:00',
      bearingOfX: BEARING_OF_X,
      frame:
        'Local grid of the survey: x along the road in the direction of travel, y to its left.',
      brief: {
        instructedBy: 'B. Castellane',
        instructedAt: '2026-10-01T11:00:00-08:00',
        dueAt: '2026-12-11T17:00:00-08:00',
        background:
          'Traffic keeps to the left. On a wet road the tractor of a laden articulated unit folded to the right and blocked both lanes. ' +
          'An oncoming van struck the bank. The claimant says that the unit was speeding; the defendant ' +
          'says that a brake valve locked the drive wheels without warning.',
        questions: [
          { number: 1, text: 'How fast was the unit when its drive wheels locked?' },
          {
            number: 2,
            text: 'How quickly did tractor and trailer turn while the trailer still rolled?',
          },
          {
            number: 3,
            text: 'With what speed and in what direction did the cab enter the opposite lane?',
          },
        ],
        cautions: [
          'Closed carriageway only. Articulated units can fold further: chock, drain the air, keep out of the gap.',
        ],
      },
      parties: [
        {
          id: 'claimant',
          name: 'The claimant, driver of the van',
          role: 'claimant',
          attorney: 'A. Thorne',
        },
        {
          id: 'defendant',
          name: 'The defendant, keeper of the unit',
          role: 'defendant',
          attorney: 'B. Castellane',
        },
      ],
      people: [
        { name: 'S. Lindqvist', role: 'lead-investigator' },
        { name: 'R. Amadi', role: 'investigator' },
        { name: 'E. Varo', role: 'technical-reviewer' },
        { name: 'J. Oduya', role: 'evidence-custodian' },
      ],
      custody: [
        ...sealedItemCustody({
          exhibit: EXHIBIT.tachograph,
          collectedAt: '2026-09-29T11:20:00-08:00',
          collectedBy: 'R. Amadi',
          custodian: 'J. Oduya',
          receivedAt: '2026-09-29T15:10:00-08:00',
          examiner: 'S. Lindqvist',
          examinedAt: '2026-10-02T09:15:00-08:00',
          seals: ['QL 204388', 'QL 204396'],
          from: 'Tarn Cutting',
        }),
        ...sealedItemCustody({
          exhibit: EXHIBIT.valve,
          collectedAt: '2026-09-30T10:05:00-08:00',
          collectedBy: 'S. Lindqvist',
          custodian: 'J. Oduya',
          receivedAt: '2026-09-30T14:30:00-08:00',
          examiner: 'S. Lindqvist',
          examinedAt: '2026-10-05T10:45:00-08:00',
          seals: ['QL 204390', 'QL 204399'],
          from: 'Recovery yard at Tarn Cutting',
        }),
      ],
      survey: {
        file: 'survey.csv',
        lengthUnit: 'm',
        delimiter: ',',
        columns: {
          id: UNIT_COLUMNS[0],
          code: UNIT_COLUMNS[1],
          string: UNIT_COLUMNS[2],
          sequence: UNIT_COLUMNS[3],
          x: UNIT_COLUMNS[4],
          y: UNIT_COLUMNS[5],
          height: UNIT_COLUMNS[6],
          sigmaX: UNIT_COLUMNS[7],
          sigmaY: UNIT_COLUMNS[8],
          remark: UNIT_COLUMNS[9],
        },
        sigmaUnit: 'mm',
        instrument: 'Total station QS 2 with 360-degree prism (invented instrument)',
        surveyedBy: 'R. Amadi',
        surveyedAt: '2026-09-29T09:15:00-08:00',
        codes: {
          CP: 'control point',
          RE: 'road edge',
          LM: 'line marking',
          SK: 'skid mark, point on a trace',
          SCR: 'scrub, point on a trace',
          TM: 'tyre mark, rolling print, point on a trace',
          RLS: 'tyre mark, begin or brake release that fixes a station',
          POR: 'point of rest, wheel of the unit',
          GO: 'gouge',
          DB: 'debris',
        },
        controlPoints: Object.keys(UNIT_CONTROL),
        lines: survey.lines,
      },
      reconstruction: reconstruction(survey, motion),
    },
    exhibits: [
      {
        ...digital,
        number: EXHIBIT.survey,
        kind: 'survey-data',
        title: 'Total-station survey of the cutting',
        description: 'Control, carriageway, five traces with five brake releases, wheels at rest.',
        source: 'Tarn Cutting, before the unit was recovered',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T09:15:00-08:00',
        condition: 'Complete export, 1 file',
        files: [['survey.csv', 'Survey export']],
      },
      {
        ...base,
        number: EXHIBIT.tachograph,
        kind: 'physical-item',
        title: 'Tachograph and trailer brake controller',
        description: 'Both units with their looms, taken from cab and trailer frame.',
        source: 'The articulated unit at its point of rest',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T11:20:00-08:00',
        condition: 'Intact, damp outside',
        packaging: 'Two antistatic bags in a rigid box',
        seal: 'QL 204396',
        location: 'Exhibit store, shelf 1',
        files: [],
      },
      {
        ...digital,
        number: EXHIBIT.readOut,
        kind: 'recorder-data',
        title: 'Read-out of tachograph and brake controller',
        description:
          'Shaft speed (nought while the drive wheels are locked), trailer wheel speed, brake pressure, 20 Hz.',
        source: 'Read out from exhibit 2',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-10-02T10:10:00-08:00',
        condition: 'Read twice, identical',
        parent: EXHIBIT.tachograph,
        files: [['tachograph.csv', 'Read-out']],
      },
      {
        ...digital,
        number: EXHIBIT.photographs,
        kind: 'photograph-set',
        title: 'Photographs of the cutting',
        description: 'Six photographs with number boards and targets on the control points.',
        source: 'Tarn Cutting',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T08:41:00-08:00',
        condition: 'Originals from the camera card',
        files: JACK_KNIFE_SHOTS.map((shot) => [photographFile(shot), shot.title] as const),
      },
      {
        ...digital,
        number: EXHIBIT.dimensions,
        kind: 'document',
        title: 'Dimensions of tractor and semi-trailer',
        description: 'Wheels and kingpin from the centres of gravity, axle loads, outlines.',
        source: 'Measured in the recovery yard',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-09-30T09:00:00-08:00',
        condition: 'Complete',
        files: [['vehicle.json', 'Dimensions']],
      },
      {
        ...digital,
        number: EXHIBIT.sketch,
        kind: 'document',
        title: 'Scene sketch',
        description: 'Field sketch with control points, traces, releases and the unit at rest.',
        source: 'Drawn at the scene',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T10:30:00-08:00',
        condition: '1 page',
        files: [['scene-sketch.pdf', 'Scene sketch']],
      },
      {
        ...base,
        number: EXHIBIT.valve,
        kind: 'physical-item',
        title: 'Brake modulator valve of the drive axle',
        description: 'Valve with both couplings capped.',
        source: 'Tractor, right frame rail',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-09-30T10:05:00-08:00',
        condition: 'Corroded connector, one pin green',
        packaging: 'Rigid box with foam',
        seal: 'QL 204399',
        location: 'Exhibit store, shelf 2',
        files: [],
      },
    ],
    texts: {
      'survey.csv': unitSurveyCsv(survey.book.rows),
      'tachograph.csv': tachographCsv(tachograph(motion)),
    },
    documents: {
      'vehicle.json': {
        format: 'centrode.demo-body/1',
        notice: NOTICE,
        bodies: unitBodies(),
        joints: JOINTS,
      },
      'truth.json': jackKnifeTruth(motion),
    },
    shots: [...JACK_KNIFE_SHOTS],
    visible: Object.entries(UNIT_CONTROL).map(([id, [x, y]]) => ({ survey: id, point: [x, y, 0] })),
    whereabouts: whereaboutsAt(ORIGIN, BEARING_OF_X),
    stages: () => jackKnifeStages(motion),
    sketch: jackKnifeSketch(survey, motion, BEARING_OF_X),
    sketchFile: 'scene-sketch.pdf',
  };
}
